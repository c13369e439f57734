export * from './brand.js';
export * from './drawing-scale.js';
export * from './format.js';
export * from './length.js';
