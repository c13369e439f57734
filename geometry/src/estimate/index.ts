export * from './contract/index.js';
export * from './from-plan/index.js';
export * from './why.js';
