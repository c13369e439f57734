/** Brands of the HEIF family that phones write (ISO/IEC 23008-12); AVIF is not among them. */
const brands = new Set(['heic', 'heix', 'heim', 'heis', 'hevc', 'hevx', 'mif1', 'msf1']);

/** Whether the file is HEIC by its first bytes; names and types as told by the system are often wrong. */
export async function isHeic(file: Blob): Promise<boolean> {
  const head = new Uint8Array(await file.slice(0, 12).arrayBuffer());
  const text = String.fromCharCode(...head);
  return text.slice(4, 8) === 'ftyp' && brands.has(text.slice(8, 12));
}

/** Good enough that a path light's lamp stays sharp, a third of the size of lossless. */
const JPEG_QUALITY = 0.92;

/** Decodes HEIC to JPEG in the browser, because the server cannot. The decoder is large and comes only when needed. */
export async function jpegFromHeic(file: File): Promise<File> {
  const { heicTo } = await import('heic-to/csp');
  const jpeg = await heicTo({ blob: file, type: 'image/jpeg', quality: JPEG_QUALITY });
  return new File([jpeg], `${file.name.replace(/\.[^.]*$/, '')}.jpg`, { type: 'image/jpeg' });
}
