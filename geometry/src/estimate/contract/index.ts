export * from './answer.js';
export * from './conductor.js';
export type { Fault } from './fault.js';
export { LISTED_FAULTS, pointerOf } from './fault.js';
export * from './normalize.js';
export { type EstimateParse, MAX_FIXTURES, parseEstimateRequest } from './parse.js';
export * from './request.js';
