export type { NightPhoto, NightRenderer, PictureSize } from './night-renderer';
export { createNightRenderer } from './renderer';
