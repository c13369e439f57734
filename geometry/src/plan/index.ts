export * from './build.js';
export * from './change.js';
export * from './edits/index.js';
export * from './equal.js';
export * from './integrity.js';
export * from './migrations.js';
export * from './rebase.js';
export * from './records.js';
