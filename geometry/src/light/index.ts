export * from './beam.js';
export * from './night-scene.js';
export * from './space.js';
