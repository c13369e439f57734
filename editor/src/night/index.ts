export { createNightRenderer, type NightPhoto, type NightRenderer, type PictureSize } from './renderer';
