import type { LuxUnit } from '@lampwright/geometry/light';
import { createContext, type ReactNode, useContext, useEffect, useLayoutEffect, useState } from 'react';
import { useStore } from 'zustand';
import { useEditor, useUnitSystem } from '../page/context';
import { NightController, type NightState } from './controller';
import type { FiguresState } from './figures-desk';
import type { NightHere } from './here';
import { exposeNightHandle } from './test-handle';
import { engineInWorker } from './worker-engine';

interface NightContextValue {
  readonly night: NightController;
  readonly here: NightHere;
}

const NightContext = createContext<NightContextValue | null>(null);

function useNightContext(): NightContextValue {
  const value = useContext(NightContext);
  if (value === null) throw new Error('This part of the night view stands outside of the plan page.');
  return value;
}

export const useNightController = (): NightController => useNightContext().night;
export const useNightHere = (): NightHere => useNightContext().here;
export const useFigures = <T,>(pick: (s: FiguresState) => T): T =>
  useStore(useNightController().figures.state, pick);

/** The unit that this person reads light in. */
export const useLuxUnit = (): LuxUnit => (useUnitSystem() === 'imperial' ? 'foot-candle' : 'lux');

export const useNight = <T,>(pick: (s: NightState) => T): T => useStore(useNightController().state, pick);

/** Light is soft, and the photo brings its own detail: more pixels than this are not seen. */
const MAP_LONG_EDGE = 960;

const noVolts: ReadonlyMap<string, number> = new Map();

/** Gives the page its night view, which follows plan, volts and hand for as long as it is open. */
export function NightProvider({
  here,
  children,
}: {
  readonly here: NightHere;
  readonly children: ReactNode;
}) {
  const editor = useEditor();
  const unit = useLuxUnit();
  const [night, setNight] = useState<NightController | null>(null);
  // Before anything is painted, so that the page never stands without it.
  // biome-ignore lint/correctness/useExhaustiveDependencies: what is here now is followed below.
  useLayoutEffect(() => {
    const { plan, session, estimate, tools } = editor;
    let answers = estimate.state.getState().answers;
    let volts = noVolts;
    const read = () => {
      if (estimate.state.getState().answers !== answers || volts === noVolts) {
        answers = estimate.state.getState().answers;
        volts = new Map([...(answers?.fixtures ?? [])].map(([id, fixture]) => [id, fixture.volts]));
      }
      return {
        doc: plan.state.getState().doc,
        sheetId: session.getState().sheetId,
        volts,
        selection: session.getState().selection,
        preview: tools.state.getState().preview ?? session.getState().proposed,
      };
    };
    const controller = new NightController(
      { ...read(), groups: here.groups, groupOf: here.groupOf, where: here.where, unit },
      {
        engine: engineInWorker(),
        now: () => new Date(),
        nextFrame: (call) => {
          requestAnimationFrame(call);
        },
        longEdge: MAP_LONG_EDGE,
        later: (ms, call) => {
          const timer = setTimeout(call, ms);
          return () => clearTimeout(timer);
        },
      },
    );
    const follow = () => {
      controller.follow(read());
      if (session.getState().mode === 'night') controller.open();
      else controller.shut();
    };
    follow();
    const stops = [plan.state, session, estimate.state, tools.state].map((store) => store.subscribe(follow));
    setNight(controller);
    const hide = exposeNightHandle(controller);
    return () => {
      hide();
      for (const stop of stops) stop();
      controller.close();
    };
  }, [editor]);
  useEffect(() => {
    night?.follow({ groups: here.groups, groupOf: here.groupOf, where: here.where, unit });
  }, [night, here, unit]);
  if (night === null) return null;
  return <NightContext value={{ night, here }}>{children}</NightContext>;
}
