export type { NightHere } from './night/here';
export { EditorContext } from './page/context';
export type { PlanEditor } from './page/editor';
export { HistoryPanel } from './page/HistoryPanel';
export { litOf } from './page/lit';
export { PanelFrame } from './page/PanelFrame';
export { type AskedQuestions, PlanPage } from './page/PlanPage';
export { readCatalogue } from './page/server';
export { usePlanEditor } from './page/use-plan-editor';
