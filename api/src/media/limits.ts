/** The limits of uploads; each is told to the user in a sentence where it is passed. */
export const MAX_UPLOAD_BYTES = 40 * 1024 * 1024;
export const MAX_PIXELS = 100_000_000;
export const MIN_EDGE_PX = 32;
export const MAX_PAGES = 50;
/** iOS shows nothing of a canvas over 16,777,216 px: 4096 squared. */
export const MAX_EDGE_PX = 4096;
export const THUMBNAIL_EDGE_PX = 480;
export const PAGE_PREVIEW_EDGE_PX = 360;
export const PAPER_DPI = 200;
/** A drawing whose lossless image would be larger is a scan, and is kept as JPEG. */
export const MAX_PNG_BYTES = 6 * 1024 * 1024;

/** The whole child with all that it starts; it is stopped before it holds 1 GB. */
export const CHILD_RSS_LIMIT_BYTES = 900 * 1024 * 1024;
export const CHILD_WALL_LIMIT_MS = 60_000;
/** Address space and processor seconds of one run of a PDF program. */
export const PDF_PROGRAM_AS_BYTES = 1024 * 1024 * 1024;
export const PDF_PROGRAM_CPU_SECONDS = 50;
export const PAGE_PREVIEW_MS = 10_000;
export const ALL_PREVIEWS_MS = 40_000;

/** Tables of catalogue items: a supplier's whole list has a few thousand rows. */
export const MAX_TABLE_BYTES = 5 * 1024 * 1024;
export const MAX_TABLE_ROWS = 5000;
export const MAX_TABLE_COLUMNS = 100;
export const MAX_CELL_CHARACTERS = 2000;
