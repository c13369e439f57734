import { imageUrl, thumbnailUrl } from './sheet-urls.js';
import type { Sheet } from './sheets.dto.js';
import type { SheetRow } from './sheets.repository.js';

/** A sheet as the API tells of it. */
export function sheetOf(row: SheetRow): Sheet {
  const ready = row.status === 'ready';
  return {
    id: row.id,
    name: row.name,
    view: row.view,
    status: row.status,
    failure: row.failure,
    canRetry: row.status === 'failed' && row.originalKey !== null,
    pageCount: row.pageCount,
    page: row.page,
    widthPx: row.widthPx,
    heightPx: row.heightPx,
    pixelsPerPaperMeter: row.pixelsPerPaperMeter,
    imageUrl: ready ? imageUrl(row.id) : null,
    thumbnailUrl: ready ? thumbnailUrl(row.id) : null,
    createdAt: row.createdAt.toISOString(),
  };
}
