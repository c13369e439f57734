export * from './electrical.js';
export * from './item.js';
