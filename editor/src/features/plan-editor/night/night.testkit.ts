import type { ControlZone, EveningPlace } from '@lampwright/geometry/light';
import type { Schedule } from '@lampwright/geometry/plan';
import { yardWith } from '../tools/driver.testkit';
import { NightController, type NightDeps, type NightInput } from './controller';
import { engineHere, type LightEngine } from './engine';

/** London on the first of December 2015: sunset 15:55, civil dusk 16:34, by a public astronomy library's tests. */
export const london: EveningPlace = {
  place: { latitude: 51.5, longitude: -0.1 },
  timeZone: 'Europe/London',
};
export const noon = new Date('2015-12-01T12:00:00Z');

export const untilEleven: Schedule = {
  on: { kind: 'sunset', minutesAfter: 0 },
  off: { kind: 'clock', at: '23:00' },
};
export const untilTen: Schedule = { ...untilEleven, off: { kind: 'clock', at: '22:00' } };

export const zone = (id: string, schedule: Schedule): ControlZone => ({
  id,
  kind: 'feed',
  name: id.toUpperCase(),
  schedule,
});

/** A clock and frames that are worked by hand. */
export class HandFrames {
  now = noon;
  private calls: (() => void)[] = [];

  get deps(): Omit<NightDeps, 'engine'> {
    return {
      now: () => this.now,
      nextFrame: (call) => this.calls.push(call),
      longEdge: 120,
      later: (_, call) => {
        this.calls.push(call);
        return () => {
          this.calls = this.calls.filter((waiting) => waiting !== call);
        };
      },
    };
  }

  /** Shows one picture. */
  frame(): void {
    const calls = this.calls;
    this.calls = [];
    for (const call of calls) call();
  }

  /** Lets frames and answers come until nothing moves any more. */
  async settle(): Promise<void> {
    for (let i = 0; i < 20; i++) {
      this.frame();
      await new Promise((resolve) => setTimeout(resolve, 0));
    }
  }
}

/** A night view of three path lights on a transformer, on a drawing of 100 pixels a metre. */
export function nightOfYard(engine: LightEngine = engineHere()) {
  const yard = yardWith(3);
  yard.use('cable').click(100, 100).click(300, 100).click(500, 100).click(700, 100).key('Enter');
  yard.use('select');
  const frames = new HandFrames();
  const input: NightInput = {
    doc: yard.doc,
    sheetId: 'sheet',
    volts: new Map(),
    groups: [],
    groupOf: new Map(),
    where: london,
    unit: 'lux',
    selection: new Set(),
    preview: null,
  };
  const night = new NightController(input, { engine, ...frames.deps });
  return { night, yard, frames, fixtures: yard.all('fixture'), transformer: yard.all('transformer')[0]! };
}
