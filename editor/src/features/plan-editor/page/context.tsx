import { scaleOfSheet } from '@lampwright/geometry/estimate';
import type { PlanDocument, SheetRecord } from '@lampwright/geometry/plan';
import { recordOf } from '@lampwright/geometry/plan';
import type { SolvedScale } from '@lampwright/geometry/sheet';
import type { UnitSystem } from '@lampwright/geometry/units';
import { createContext, useContext } from 'react';
import { useStore } from 'zustand';
import type { CameraState } from '../canvas/camera-store';
import type { EstimateState } from '../estimate/controller';
import type { SessionState } from '../store/session';
import type { ToolHostState } from '../tools/host';
import type { PlanEditor } from './editor';
import type { PlanPortState } from './plan-port';

export interface EditorContextValue {
  readonly editor: PlanEditor;
  readonly units: UnitSystem;
}

export const EditorContext = createContext<EditorContextValue | null>(null);

function useEditorContext(): EditorContextValue {
  const value = useContext(EditorContext);
  if (value === null) throw new Error('This part of the plan page stands outside of the plan page.');
  return value;
}

export const useEditor = (): PlanEditor => useEditorContext().editor;
export const useUnitSystem = (): UnitSystem => useEditorContext().units;
export const usePlan = <T,>(pick: (s: PlanPortState) => T): T => useStore(useEditor().plan.state, pick);
export const useDoc = (): PlanDocument => usePlan((s) => s.doc);
export const useSession = <T,>(pick: (s: SessionState) => T): T => useStore(useEditor().session, pick);
export const useEstimate = <T,>(pick: (s: EstimateState) => T): T =>
  useStore(useEditor().estimate.state, pick);
export const useTools = <T,>(pick: (s: ToolHostState) => T): T => useStore(useEditor().tools.state, pick);
export const useCamera = <T,>(pick: (s: CameraState) => T): T => useStore(useEditor().camera.state, pick);

export function useSheet(): SheetRecord | undefined {
  const sheetId = useSession((s) => s.sheetId);
  return recordOf(useDoc(), sheetId, 'sheet');
}

export function useScale(): SolvedScale | null {
  const sheet = useSheet();
  const result = sheet === undefined ? null : scaleOfSheet(sheet);
  return result?.ok ? result.scale : null;
}
