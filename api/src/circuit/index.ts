export { conductorAmpacity, conductorOhmsPerMeter, loopOhms } from './conductors.js';
export { NoConvergence } from './no-convergence.js';
export { type SolveStatistics, solveEstimate } from './solve.js';
export { openVolts, sagPerVoltAmpere } from './supply.js';
export { solverVersion } from './version.js';
