export * from './problem.js';
export { designSite } from './site.js';
