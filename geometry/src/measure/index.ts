export * from './crossing.js';
export * from './cut-length.js';
export * from './polygon.js';
export * from './simplify.js';
