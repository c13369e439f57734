export * from './cable-lengths.js';
export * from './conduit.js';
export * from './fault.js';
export * from './plan-faults.js';
export * from './request.js';
export { scaleOfSheet, sheetPoint } from './sheet-scale.js';
export { capitalised, listed, voltsInWords } from './words.js';
