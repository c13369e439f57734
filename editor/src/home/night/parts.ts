/** What the page loads once it has shown the garden by day. */
export { EveningLine } from './evening-line';
export { momentInWords } from './moment-words';
export { NightCanvas } from './night-canvas';
export { sheetEvening } from './sheet-evening';
