export * from './catalogue.js';
export * from './jobs.js';
export * from './mail.js';
export * from './people.js';
export * from './plans.js';
export * from './sheets.js';
