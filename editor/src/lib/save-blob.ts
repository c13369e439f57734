/** Hands bytes to the browser's downloads under a name. */
export function saveBlob(blob: Blob, fileName: string): void {
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = fileName;
  link.click();
  // The download has taken hold of it by the next turn of the event loop at the latest.
  setTimeout(() => URL.revokeObjectURL(url), 0);
}
