export { EditorContext } from './page/context';
export { HistoryPanel } from './page/HistoryPanel';
export { PlanPage } from './page/PlanPage';
export { readCatalogue } from './page/server';
export { usePlanEditor } from './page/use-plan-editor';
