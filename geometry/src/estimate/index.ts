export * from './contract/index.js';
