export * from './job-pricing.js';
export * from './price-book.js';
export * from './quote.js';
