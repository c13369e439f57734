export * from './lamps.js';
export * from './year.js';
