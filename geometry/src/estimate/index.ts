export * from './contract/index.js';
export * from './from-plan/index.js';
