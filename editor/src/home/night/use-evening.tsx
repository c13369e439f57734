import { type CSSProperties, type ReactNode, useMemo, useState } from 'react';
import type { Choice } from '../choice';
import type { Picture, SharedPage } from '../share';
import styles from './evening.module.css';
import type { SheetEvening } from './sheet-evening';
import { useNight } from './use-night';

/** How one sheet is seen: by day, or through its evening. */
export interface Evening {
  /** There is one: the sheet has a scale, so that its light can be worked out. */
  readonly offered: boolean;
  /** The garden is seen after sunset, or will be as soon as it can be drawn. */
  readonly dark: boolean;
  /** Lies over the photo. */
  readonly over: (style: CSSProperties) => ReactNode;
  /** Under the picture, in a place that is kept for it from the start. */
  readonly line: ReactNode;
  readonly heightPx: number;
  /** The plain photo is looked at. */
  readonly byDay: boolean;
  /** Goes to the plain photo and back; null where there is nothing to go to yet. */
  readonly toggle: (() => void) | null;
  readonly onPhoto: (photo: HTMLImageElement) => void;
}

/** The line with its times and its hours; and its switches where there are several. */
const LINE_PX = 100;
const ZONES_PX = 62;

interface Photo {
  readonly sheetId: string;
  readonly element: HTMLImageElement;
  readonly source: string;
}

export function useEvening(
  linkId: string,
  page: SharedPage,
  picture: Picture | undefined,
  choice: Choice,
): Evening {
  const { locale, price } = page.document;
  const sheetId = picture?.sheetId;
  const zones = picture?.night?.zones ?? 0;
  const offered = zones > 0;
  const heightPx = !offered ? 0 : zones > 1 ? LINE_PX + ZONES_PX : LINE_PX;
  const [now] = useState(() => new Date());
  const [photo, setPhoto] = useState<Photo | null>(null);
  const { night, fail, retry } = useNight(linkId, page.revisionId, offered && photo !== null);
  /** Null: where it begins. */
  const [minute, setMinute] = useState<number | null>(null);
  const [darkened, setDarkened] = useState<ReadonlySet<string>>(new Set());
  const [byDay, setByDay] = useState(false);

  const evening = useMemo<SheetEvening | null>(() => {
    if (night.kind !== 'ready') return null;
    const { scenes, evening: place } = night.night;
    const scene = scenes.find((one) => one.sheetId === sheetId);
    const names = new Map(price.groups.flatMap(({ id, name }) => (id === null ? [] : [[id, name]])));
    return scene ? night.parts.sheetEvening(scene, scenes, place, now, locale, names) : null;
  }, [night, sheetId, now, locale, price]);

  const moment = useMemo(() => evening?.at(minute ?? evening.begin), [evening, minute]);
  const lit = moment ? [...moment.on].filter((id) => !darkened.has(id)).join(' ') : '';
  const sources = evening?.scene.sources;
  const shares = useMemo(() => {
    const on = new Set(lit.split(' '));
    return new Map(
      sources?.map(({ id, zoneId, groupId }) => [
        id,
        on.has(zoneId) && (groupId === null || choice.has(groupId)) ? 1 : 0,
      ]),
    );
  }, [sources, lit, choice]);
  const sunDegrees = moment?.sunDegrees ?? 0;
  const shown = useMemo(() => ({ sunDegrees, shares }), [sunDegrees, shares]);

  const here = photo && photo.sheetId === sheetId ? photo : null;

  return {
    offered,
    dark: offered && night.kind !== 'failed' && !byDay && moment?.sky !== 'day',
    over: (style) =>
      night.kind === 'ready' &&
      evening &&
      here && (
        <night.parts.NightCanvas
          scene={evening.scene}
          photo={here.element}
          source={here.source}
          shown={shown}
          hidden={byDay}
          style={style}
          onFailed={fail}
        />
      ),
    line: offered && (
      <div className={styles.evening} style={{ minHeight: heightPx }}>
        {night.kind === 'failed' ? (
          <div className={styles.failed} role="status">
            <p>The evening can’t be shown just now, so here is the garden by day.</p>
            <button type="button" className="button" onClick={retry}>
              Try again
            </button>
          </div>
        ) : night.kind === 'ready' && evening && moment ? (
          <night.parts.EveningLine
            evening={evening}
            moment={moment}
            darkened={darkened}
            onMinute={(next) => {
              setMinute(next);
              setByDay(false);
            }}
            onDarkened={setDarkened}
          />
        ) : (
          <p className={styles.loading}>The evening is coming …</p>
        )}
      </div>
    ),
    byDay: byDay || night.kind === 'failed',
    heightPx,
    toggle: night.kind === 'ready' && evening ? () => setByDay(!byDay) : null,
    onPhoto: (element) => sheetId !== undefined && setPhoto({ sheetId, element, source: element.currentSrc }),
  };
}
