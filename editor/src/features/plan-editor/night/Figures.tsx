import {
  figuresCsv,
  type LuxFigures,
  type LuxRow,
  luxText,
  luxUnitText,
  shortOf,
} from '@lampwright/geometry/light';
import { type LightTarget, labelOf, type PlanDocument } from '@lampwright/geometry/plan';
import { useMemo } from 'react';
import { saveBlob } from '../../../lib/save-blob';
import { useDoc, useEditor, useSession } from '../page/context';
import { useFigures, useLuxUnit, useNight, useNightController } from './context';
import styles from './light-panel.module.css';
import { Part } from './Part';

interface Told {
  readonly id: string;
  readonly name: string;
  readonly kind: 'path' | 'area';
  /** Null: it is not all on the ground. */
  readonly figures: LuxFigures | null;
  readonly target: LightTarget | null;
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

function nameOf(doc: PlanDocument, id: string): string {
  const record = doc.get(id);
  return record === undefined ? '' : capital(labelOf(record, doc));
}

/** What is chosen or has a target, as far as its light is worked out. */
function useTold(): readonly Told[] {
  const doc = useDoc();
  const asked = useFigures((s) => s.asked);
  const answer = useFigures((s) => s.answer);
  return useMemo(
    () =>
      (asked?.subjects ?? []).flatMap(({ id, kind }) => {
        const record = doc.get(id);
        if (record === undefined || !('lightTarget' in record)) return [];
        const figures = answer?.figures.get(id) ?? null;
        return [{ id, kind, name: nameOf(doc, id), figures, target: record.lightTarget }];
      }),
    [doc, asked, answer],
  );
}

/** Light on the ground in figures: along measured paths and in areas, against what is wanted there. */
export function Figures({ jobName }: { readonly jobName: string }) {
  const night = useNightController();
  const editor = useEditor();
  const unit = useLuxUnit();
  const told = useTold();
  const stale = useFigures((s) => s.stale);
  const problem = useFigures((s) => s.problem);
  const shown = useNight((s) => s.luxOnGround);
  const allOn = useNight((s) => s.groupsOff.size === 0 && ![...s.looks.values()].includes('off'));
  const rows: LuxRow[] = told.flatMap(({ figures, ...row }) =>
    figures === null ? [] : [{ ...row, figures }],
  );
  const exportAll = () =>
    saveBlob(
      new Blob([figuresCsv(rows, unit)], { type: 'text/csv;charset=utf-8' }),
      `${jobName.replace(/[^\p{L}\p{N}]+/gu, '-').replace(/^-|-$/g, '')}-light.csv`,
    );
  return (
    <Part
      title="Light on the ground"
      aside={
        rows.length > 0 && (
          <button type="button" className={styles.action} onClick={exportAll}>
            Export CSV
          </button>
        )
      }
    >
      <label className={styles.tick}>
        <input type="checkbox" checked={shown} onChange={(event) => night.showLux(event.target.checked)} />
        Show {unit === 'lux' ? 'lux' : 'foot-candles'} on the drawing
      </label>
      {problem !== null && (
        <p role="alert">
          The figures could not be worked out: {problem}{' '}
          <button type="button" className={styles.action} onClick={() => night.figures.retry()}>
            Try again
          </button>
        </p>
      )}
      <div className={styles.told} data-stale={stale || undefined} aria-live="polite">
        {told.map((row) => (
          <One key={row.id} told={row} />
        ))}
      </div>
      {told.length === 0 ? (
        <div className={styles.choose}>
          <p className={styles.small}>
            Measure a path, or choose an area, and its light is told here. What has a target stays in the
            list.
          </p>
          {editor.canEdit && (
            <button type="button" className={styles.action} onClick={() => editor.use('measure')}>
              Measure a path
            </button>
          )}
        </div>
      ) : (
        <p className={styles.small}>
          {allOn
            ? 'With every light on, whatever the hour.'
            : 'Without what is switched off above, whatever the hour.'}
        </p>
      )}
    </Part>
  );
}

function One({ told: { id, name, figures, target } }: { readonly told: Told }) {
  const editor = useEditor();
  const unit = useLuxUnit();
  const chosen = useSession((s) => s.selection.has(id));
  const short = figures === null || target === null ? [] : shortOf(figures, target, unit);
  const figure = (lux: number) => luxText(lux, unit).replace(` ${luxUnitText(unit)}`, '');
  return (
    <section className={styles.one} aria-label={name} data-chosen={chosen || undefined}>
      <header className={styles.head}>
        <button type="button" className={styles.link} onClick={() => editor.reveal(id)}>
          {name}
        </button>
        {figures !== null && target !== null && (
          <span className={styles.verdict} data-met={short.length === 0 || undefined}>
            {short.length === 0 ? 'Meets its target' : 'Short of its target'}
          </span>
        )}
      </header>
      {figures === null ? (
        <p className={styles.small}>It is not all on the ground, so its light can’t be told.</p>
      ) : (
        <dl className={styles.figures}>
          {[
            { word: 'Least', lux: figures.least.lux },
            { word: 'Mean', lux: figures.meanLux },
            { word: 'Most', lux: figures.most.lux },
          ].map(({ word, lux }) => (
            <div key={word}>
              <dt>
                {word}, {luxUnitText(unit)}
              </dt>
              <dd>{figure(lux)}</dd>
            </div>
          ))}
          <div>
            <dt>Evenness</dt>
            <dd>{figures.uniformity.toFixed(2)}</dd>
          </div>
        </dl>
      )}
      {short.map((sentence) => (
        <p key={sentence}>{sentence}</p>
      ))}
      {figures?.notes.map((note) => (
        <p key={note} className={styles.small}>
          {note}
        </p>
      ))}
    </section>
  );
}
