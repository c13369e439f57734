import type { LightSource, NightScene } from '@lampwright/geometry/light';
import type { SharedNight } from '../share';

/** The night of the made-up proposal, at a made-up place whose clocks are six or five hours behind UTC. */

const source = (
  id: string,
  kind: LightSource['kind'],
  zoneId: string,
  groupId: string | null,
): LightSource => ({
  id,
  kind,
  x: 0,
  y: 0,
  z: 0.4,
  axis: [0, 0, -1],
  peakCandela: 60,
  halfAngle: 1,
  shield: 0,
  quantity: 1,
  output: 1,
  cctKelvin: 2700,
  zoneId,
  groupId,
  treeId: null,
});

const zone = (id: string, off: string): NightScene['zones'][number] => ({
  id,
  kind: 'feed',
  name: id.toUpperCase(),
  schedule: { on: { kind: 'sunset', minutesAfter: 0 }, off: { kind: 'clock', at: off } },
});

export const sampleScene = (over: Partial<NightScene> = {}): NightScene => ({
  sheetId: 'photo',
  view: 'photo',
  widthPx: 2400,
  heightPx: 1600,
  groundMatrix: [0.01, 0, 0, 0, 0.01, 0, 0, 0, 1],
  whiteLux: 40,
  sources: [
    source('p1', 'path', 't1', 'path'),
    source('p2', 'path', 't1', 'path'),
    source('u1', 'up', 't2', 'bed'),
    source('w1', 'up', 't2', 'wall'),
  ],
  faces: [],
  trees: [],
  buildings: [],
  zones: [zone('t1', '23:00'), zone('t2', '22:00')],
  ...over,
});

/** All on one feed. */
export const oneZone = (): NightScene => {
  const scene = sampleScene();
  return {
    ...scene,
    sources: scene.sources.map((one) => ({ ...one, zoneId: 't1' })),
    zones: scene.zones.slice(0, 1),
  };
};

export const sampleNight = (over: Partial<SharedNight> = {}): SharedNight => ({
  evening: { place: { latitude: 41.88, longitude: -87.63 }, timeZone: 'America/Chicago' },
  scenes: [sampleScene()],
  ...over,
});
