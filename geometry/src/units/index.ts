export * from './brand.js';
