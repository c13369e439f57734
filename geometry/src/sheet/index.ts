export * from './calibration.js';
export * from './homography.js';
