export * from './clock.js';
export * from './evening.js';
