import type { NightPhoto, PictureSize } from './night-renderer';

/** The photo at the picture's size, as both renderers read it. Throws where the photo is of another site. */
export function photoPixels(photo: NightPhoto, { width, height }: PictureSize): ImageData {
  const canvas = document.createElement('canvas');
  canvas.width = width;
  canvas.height = height;
  const context = canvas.getContext('2d', { willReadFrequently: true });
  if (!context) throw new Error('This browser gives no canvas to draw on.');
  // Clear parts of a drawing are paper.
  context.fillStyle = '#fff';
  context.fillRect(0, 0, width, height);
  context.imageSmoothingQuality = 'high';
  context.drawImage(photo, 0, 0, width, height);
  return context.getImageData(0, 0, width, height);
}
