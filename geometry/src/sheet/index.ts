export * from './calibration.js';
export * from './camera.js';
export * from './homography.js';
