// @vitest-environment jsdom
import type { LightMap, Look } from '@lampwright/geometry/night';
import { act, cleanup, configure, fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import { StrictMode } from 'react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Home } from '../home';
import { sampleLinkId, samplePage } from '../home.testkit';
import { fakeServer } from '../server.testkit';
import type { SharedPage } from '../share';
import type { Shares } from './lights';
import { sampleNight, sampleScene } from './night.testkit';

// What the page loads later is compiled first, which takes a busy machine its time.
configure({ asyncUtilTimeout: 15_000 });

/** A device that draws: what stands on its canvas is what was drawn last. */
const device = vi.hoisted(() => ({
  canDraw: true,
  canSum: true,
  /** Renderers that were made and not given back. */
  open: 0,
  made: 0,
  shown: null as { on: string[]; sunDegrees: number; whiteLux: number } | null,
}));

vi.mock('./lights', () => ({
  lightsOf: () => ({
    sum: async (shares: Shares): Promise<LightMap> => {
      if (!device.canSum) throw new Error('Out of memory.');
      const on = [...shares].flatMap(([id, share]) => (share > 0 ? [id] : []));
      return { on } as unknown as LightMap;
    },
    close: () => {},
  }),
}));
vi.mock('../../night', () => ({
  createNightRenderer: () => {
    if (!device.canDraw) throw new Error('This browser gives no canvas to draw on.');
    device.open++;
    device.made++;
    return {
      kind: 'webgl',
      draw: (light: LightMap, look: Look, whiteLux: number) => {
        const { on } = light as unknown as { on: string[] };
        device.shown = { on, sunDegrees: look.sunAltitudeDegrees, whiteLux };
      },
      drawn: async () => {},
      setPhoto: () => {},
      dispose: () => {
        device.open--;
      },
    };
  },
}));

beforeEach(() => {
  Object.assign(device, { canDraw: true, canSum: true, open: 0, made: 0, shown: null });
  vi.useFakeTimers({ toFake: ['Date'], now: new Date('2026-12-01T20:00:00Z') });
  sessionStorage.clear();
  window.history.replaceState(null, '', '/p/token');
  vi.stubGlobal('scrollTo', vi.fn());
  vi.stubGlobal('CSS', { escape: (text: string) => text });
});
afterEach(() => {
  cleanup();
  vi.useRealTimers();
  vi.unstubAllGlobals();
  Reflect.deleteProperty(document, 'visibilityState');
});

async function show(page: SharedPage = samplePage(), night = sampleNight()) {
  const server = fakeServer(page);
  server.night = night;
  render(
    <StrictMode>
      <Home link={{ kind: 'live', id: sampleLinkId, back: false }} />
    </StrictMode>,
  );
  await screen.findByRole('heading', { level: 1 });
  return server;
}

const photo = () => document.querySelector('picture img')!;
const frame = () => screen.getByRole('group', { name: /picture with/ });
const line = () => screen.getByRole<HTMLInputElement>('slider', { name: 'Time of the evening' });
const said = () => line().getAttribute('aria-valuetext')?.replace(/\s/g, ' ');
const press = (element: Element) => act(async () => fireEvent.click(element));
const button = (name: string | RegExp) => screen.getByRole<HTMLButtonElement>('button', { name });
const total = () => screen.getByText('Total', { selector: 'dt' }).nextSibling?.textContent;
const move = (minute: number) =>
  act(async () => fireEvent.change(line(), { target: { value: String(minute) } }));

async function showNight(page?: SharedPage, night = sampleNight()) {
  const server = await show(page, night);
  fireEvent.load(photo());
  await waitFor(() => expect(device.shown).not.toBeNull());
  return server;
}

describe('the evening', () => {
  it('is asked for only when the garden is seen by day', async () => {
    const server = await show();
    expect(screen.queryByRole('slider')).toBeNull();
    expect(screen.getByText(/^Artist’s impression from the planned lights and their beams/)).toBeTruthy();
    expect(server.gets.some((path) => path.endsWith('/night'))).toBe(false);
    fireEvent.load(photo());
    await waitFor(() => expect(said()).toMatch(/PM, dark, lights on$/));
    expect(server.gets.filter((path) => path.endsWith('/night'))).toHaveLength(1);
  });

  it('begins in the dark, with the lights that are chosen', async () => {
    await showNight();
    expect(device.shown).toMatchObject({ on: ['p1', 'p2', 'u1'], whiteLux: 40 });
    expect(device.shown!.sunDegrees).toBeLessThan(-12);
    expect(screen.getByText(/^Sunset 4:2\d\sPM$/)).toBeTruthy();
    expect(screen.getByText(/^Off 11:00\sPM$/)).toBeTruthy();
  });

  it('follows the line: lights come on at sunset and go off zone by zone', async () => {
    await showNight();
    await move(0);
    await waitFor(() => expect(device.shown?.on).toEqual([]));
    expect(device.shown!.sunDegrees).toBeGreaterThan(0);
    expect(said()).toMatch(/daylight, lights off$/);
    await move(45);
    await waitFor(() => expect(device.shown?.on).toEqual(['p1', 'p2', 'u1']));
    const end = Number(line().max);
    await move(end - 45);
    await waitFor(() => expect(device.shown?.on).toEqual(['p1', 'p2']));
    expect(said()).toMatch(/dark, Path to the patio on$/);
    await move(end);
    await waitFor(() => expect(device.shown?.on).toEqual([]));
  });

  it('switches a group in the picture as in the price', async () => {
    await showNight();
    expect(total()).toBe('$3,417.00');
    await press(screen.getByRole('checkbox', { name: /^Wall and tree/ }));
    expect(total()).toBe('$4,740.00');
    await waitFor(() => expect(device.shown?.on).toEqual(['p1', 'p2', 'u1', 'w1']));
    await press(screen.getByRole('checkbox', { name: /^Path to the patio/ }));
    await waitFor(() => expect(device.shown?.on).toEqual(['u1', 'w1']));
  });

  it('darkens what switches apart only to look at it: the price stays', async () => {
    await showNight();
    const zones = within(screen.getByRole('group', { name: /^Look at it with .only for looking/ }));
    const path = zones.getByRole('button', { name: /^Path to the patio\s*sunset to 11:00\sPM$/ });
    expect(path.getAttribute('aria-pressed')).toBe('true');
    await press(path);
    expect(path.getAttribute('aria-pressed')).toBe('false');
    await waitFor(() => expect(device.shown?.on).toEqual(['u1']));
    expect(said()).toMatch(/dark, Up-lights on$/);
    expect(total()).toBe('$3,417.00');
  });

  it('gives the plain photo with its marks, and the evening again where it was left', async () => {
    await showNight();
    await move(60);
    const marks = () => frame().hasAttribute('data-dark');
    expect(marks()).toBe(true);
    await press(button('By daylight'));
    expect(button('By daylight').getAttribute('aria-pressed')).toBe('true');
    expect(marks()).toBe(false);
    expect(frame().querySelector('[data-drawn]')).toBeNull();
    await press(button('By daylight'));
    expect(marks()).toBe(true);
    expect(line().value).toBe('60');
    await press(button('By daylight'));
    // To move the line is to look at the evening.
    await move(65);
    expect(button('By daylight').getAttribute('aria-pressed')).toBe('false');
  });

  it('is said of one zone in a sentence, without switches', async () => {
    const scene = sampleScene();
    const night = sampleNight({
      scenes: [
        {
          ...scene,
          zones: scene.zones.slice(0, 1),
          sources: scene.sources.map((one) => ({ ...one, zoneId: 't1' })),
        },
      ],
    });
    await showNight(undefined, night);
    expect(screen.getByText(/^Lights on from sunset to 11:00\sPM$/)).toBeTruthy();
    expect(screen.queryByText(/^Look at it with/)).toBeNull();
  });

  it('says that the place is not known', async () => {
    const { evening } = sampleNight();
    await showNight(undefined, sampleNight({ evening: { ...evening, place: null } }));
    expect(screen.getByText(/^Where the garden lies is not known here/)).toBeTruthy();
  });

  it('goes from sheet to sheet, each with a picture of its own', async () => {
    const page = samplePage();
    const [sheet] = page.document.sheets;
    const [picture] = page.pictures;
    const plan = { ...sheet!, id: 'plan', name: 'Plot plan', view: 'plan' as const };
    const bare = { ...sheet!, id: 'bare', name: 'Side yard' };
    page.document.sheets.push(plan, bare);
    page.pictures.push(
      { ...picture!, sheetId: 'plan', night: { zones: 1 } },
      { ...picture!, sheetId: 'bare', night: null },
    );
    const scene = sampleScene();
    const night = sampleNight({
      scenes: [scene, { ...scene, sheetId: 'plan', view: 'plan', sources: scene.sources.slice(2, 3) }],
    });
    const server = await showNight(page, night);
    await move(60);
    await press(screen.getByRole('tab', { name: 'Plot plan' }));
    expect(device.open).toBe(0);
    fireEvent.load(photo());
    await waitFor(() => expect(device.shown?.on).toEqual(['u1']));
    expect(device.open).toBe(1);
    expect(line().value).toBe('60');
    // Without a scale there is no evening to show.
    await press(screen.getByRole('tab', { name: 'Side yard' }));
    expect(screen.queryByRole('slider')).toBeNull();
    expect(screen.queryByRole('button', { name: 'By daylight' })).toBeNull();
    expect(frame().hasAttribute('data-dark')).toBe(false);
    expect(server.gets.filter((path) => path.endsWith('/night'))).toHaveLength(1);
  });
});

describe('where there is no evening', () => {
  it('shows the garden by day as ever', async () => {
    const page = samplePage();
    page.pictures = page.pictures.map((picture) => ({ ...picture, night: null }));
    const server = await show(page);
    fireEvent.load(photo());
    await act(async () => new Promise((resolve) => setTimeout(resolve, 50)));
    expect(server.gets.some((path) => path.endsWith('/night'))).toBe(false);
    expect(screen.queryByRole('slider')).toBeNull();
    expect(frame().hasAttribute('data-dark')).toBe(false);
    expect(screen.getByText(/^Artist’s impression: the marks show where lights will stand/)).toBeTruthy();
  });

  const failing = 'The evening can’t be shown just now, so here is the garden by day.';

  it('says so when it does not load, and tries again', async () => {
    const server = await show();
    server.nightAnswers.push('no-network');
    fireEvent.load(photo());
    expect((await screen.findByText(failing)).closest('[role=status]')).toBeTruthy();
    expect(frame().hasAttribute('data-dark')).toBe(false);
    expect(button('By daylight').getAttribute('aria-disabled')).toBe('true');
    await press(button('Try again'));
    await waitFor(() => expect(said()).toMatch(/dark, lights on$/));
  });

  it.each([
    ['can’t draw', { canDraw: false }],
    ['can’t add the light up', { canSum: false }],
  ])('says so on a device that %s', async (_, cannot) => {
    Object.assign(device, cannot);
    await show();
    fireEvent.load(photo());
    expect(await screen.findByText(failing)).toBeTruthy();
    expect(frame().hasAttribute('data-dark')).toBe(false);
    expect(device.open).toBe(0);
    // The rest of the page is as ever.
    expect(total()).toBe('$3,417.00');
  });
});

it('keeps nothing of the picture while the page is in the background', async () => {
  await showNight();
  const turn = (state: DocumentVisibilityState) =>
    act(async () => {
      Object.defineProperty(document, 'visibilityState', { value: state, configurable: true });
      document.dispatchEvent(new Event('visibilitychange'));
    });
  expect(device.open).toBe(1);
  const { made } = device;
  await turn('hidden');
  expect(device.open).toBe(0);
  expect(document.querySelector('canvas')).toBeNull();
  await turn('visible');
  await waitFor(() => expect(device.made).toBeGreaterThan(made));
  expect(device.open).toBe(1);
});
