import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import {
  apply,
  type Change,
  defaultSettings,
  type PlanDocument,
  type PlanRecord,
  planOf,
} from '@lampwright/geometry/plan';
import { createRoot } from 'react-dom/client';
import { createStore } from 'zustand/vanilla';
import { PlanCanvas } from '../src/features/plan-editor/canvas/PlanCanvas';
import { EditorContext } from '../src/features/plan-editor/page/context';
import { PlanEditor } from '../src/features/plan-editor/page/editor';
import type { PlanPort, PlanPortState } from '../src/features/plan-editor/page/plan-port';
import { drawBare } from './bare';

/** Milliseconds a frame, for one number of fixtures. */
export interface FrameTimes {
  readonly fixtures: number;
  readonly pan: number;
  readonly drag: number;
  readonly bare: number;
}

declare global {
  interface Window {
    benchCanvas: (fixtures: number) => Promise<FrameTimes>;
  }
}

const WIDTH = 2400;
const HEIGHT = 1600;
const FRAMES = 90;
const WARM_UP = 15;
/** Fixtures that are dragged together. */
const DRAGGED = 50;

const fixtureItem: CatalogueItem = {
  category: 'fixture',
  name: 'Path light',
  kind: 'path',
  lead: { conductor: { awg: 18 }, lengthMeters: 0.9 },
  mountingHeightMeters: null,
  wetListed: false,
  light: 'integrated',
  load: { kind: 'driver', watts: 3, minVolts: 9 },
  window: { minVolts: 9, maxVolts: 15 },
  target: null,
  lumens: null,
  beamDegrees: null,
  cctKelvin: null,
};
const cableItem: CatalogueItem = {
  category: 'cable',
  name: '12 AWG',
  conductor: { awg: 12 },
  ampacityAmps: null,
  directBurial: true,
};

/** A grid of fixtures, each wired to its neighbour. */
function planWith(count: number): PlanDocument {
  const across = Math.ceil(Math.sqrt((count * WIDTH) / HEIGHT));
  const down = Math.ceil(count / across);
  const records: PlanRecord[] = [
    {
      kind: 'sheet',
      id: 'sheet',
      name: 'Sheet',
      order: 0,
      widthPx: WIDTH,
      heightPx: HEIGHT,
      view: 'plan',
      pixelsPerPaperMeter: null,
      groundMetersPerPaperMeter: null,
      whiteLux: null,
      references: [],
    },
    defaultSettings('us'),
    { kind: 'item', id: 'light', sourceId: null, item: fixtureItem },
    { kind: 'item', id: 'cable', sourceId: null, item: cableItem },
  ];
  for (let i = 0; i < count; i++) {
    const at = {
      x: ((i % across) + 0.5) * (WIDTH / across),
      y: (Math.floor(i / across) + 0.5) * (HEIGHT / down),
    };
    records.push({
      kind: 'fixture',
      id: `f${i}`,
      sheetId: 'sheet',
      at,
      number: i + 1,
      name: '',
      itemId: 'light',
      lampId: null,
      quantity: 1,
      lead: null,
      aim: null,
      mountingHeightMeters: null,
      zoneId: null,
      note: '',
    });
    if (i > 0)
      records.push({
        kind: 'cable',
        id: `c${i}`,
        sheetId: 'sheet',
        runId: null,
        fromId: `f${i - 1}`,
        toId: `f${i}`,
        via: [],
        itemId: 'cable',
        measuredMeters: null,
        slackFromMeters: null,
        slackToMeters: null,
        riseMeters: 0,
        extraOhms: 0,
        markedToMarked: false,
      });
  }
  return planOf(records);
}

function portOn(doc: PlanDocument): PlanPort {
  const state = createStore<PlanPortState>(() => ({
    doc,
    undoLabel: null,
    redoLabel: null,
    save: { kind: 'saved', at: null },
    conflicts: [],
    choices: new Map(),
  }));
  return {
    state,
    commit: (change: Change) => state.setState({ doc: apply(state.getState().doc, change) }),
    undo: () => null,
    redo: () => null,
    resolve: () => {},
    close: () => {},
  };
}

/** A sheet like a photo: noise, so that scaling it costs what a photo costs. */
function sheetPicture(): HTMLCanvasElement {
  const picture = document.createElement('canvas');
  picture.width = WIDTH;
  picture.height = HEIGHT;
  const ctx = picture.getContext('2d')!;
  let seed = 7;
  for (let i = 0; i < 4000; i++) {
    seed = (seed * 1_103_515_245 + 12_345) % 2_147_483_648;
    ctx.fillStyle = `hsl(${seed % 360} 30% 50%)`;
    ctx.fillRect(seed % WIDTH, (seed >> 8) % HEIGHT, 60, 60);
  }
  return picture;
}

const nextFrame = () => new Promise<void>((resolve) => requestAnimationFrame(() => resolve()));

/** Mean time from frame to frame while `step` runs in each; the browser's frame limit is off. */
async function framesOf(step: (i: number) => void): Promise<number> {
  for (let i = 0; i < WARM_UP; i++) {
    step(i);
    await nextFrame();
  }
  const from = performance.now();
  for (let i = 0; i < FRAMES; i++) {
    step(i);
    await nextFrame();
  }
  return (performance.now() - from) / FRAMES;
}

window.benchCanvas = async (fixtures) => {
  const picture = sheetPicture();
  const url = URL.createObjectURL(await new Promise<Blob>((resolve) => picture.toBlob((b) => resolve(b!))));
  const editor = new PlanEditor(portOn(planWith(fixtures)), true, 'sheet', {
    ask: () => Promise.reject(new Error('The bench asks for no volts.')),
    sentence: () => '',
  });
  const frame = document.getElementById('drawing')!;
  const bare = document.getElementById('bare') as HTMLCanvasElement;
  frame.style.display = 'block';
  bare.style.display = 'none';
  const root = createRoot(frame);
  root.render(
    <EditorContext value={{ editor, units: 'imperial' }}>
      <PlanCanvas imageUrl={url} />
    </EditorContext>,
  );
  // Until the picture is decoded and the typeface is there.
  await new Promise((resolve) => setTimeout(resolve, 1200));
  editor.camera.zoom(1.2);

  const pan = await framesOf((i) => editor.camera.pan(i % 2 === 0 ? 3 : -3, i % 4 < 2 ? 2 : -2));

  const mods = { shift: false, alt: false };
  editor.select(Array.from({ length: Math.min(DRAGGED, fixtures) }, (_, i) => `f${i}`));
  const grip = editor.doc.get('f0');
  const at = grip !== undefined && 'at' in grip ? grip.at : { x: 0, y: 0 };
  editor.tools.handle({ type: 'down', at, mods });
  const drag = await framesOf((i) =>
    editor.tools.handle({ type: 'move', at: { x: at.x + 10 + (i % 40), y: at.y + 10 + (i % 23) }, mods }),
  );
  editor.tools.handle({ type: 'cancel' });

  const scene = { camera: editor.camera.camera, doc: editor.doc, picture };
  root.unmount();
  frame.style.display = 'none';
  bare.style.display = 'block';
  const ctx = bare.getContext('2d')!;
  const plain = await framesOf((i) =>
    drawBare(ctx, { ...scene, camera: { ...scene.camera, x: scene.camera.x + (i % 2) * 3 } }),
  );
  editor.close();
  URL.revokeObjectURL(url);
  return { fixtures, pan, drag, bare: plain };
};
