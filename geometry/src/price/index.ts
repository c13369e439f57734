export * from './combinations.js';
export * from './job-pricing.js';
export * from './money.js';
export * from './price-book.js';
export * from './quote.js';
export * from './totals.js';
export * from './usual.js';
