import { type RunRecord, recordOf, recordsOf } from '@lampwright/geometry/plan';
import { METERS_PER_FOOT, type UnitSystem } from '@lampwright/geometry/units';
import { useEffect, useMemo, useRef, useState } from 'react';
import { FixtureGlyphShape } from '../../../plan-view/FixtureGlyph';
import { lookWord } from '../../../plan-view/fixture-look';
import { runOfNodes } from '../../../plan-view/scene';
import { ampsText, voltAmpsText, voltsText } from '../../../plan-view/words';
import { useDoc, useEditor, useEstimate, useSession, useUnitSystem } from '../page/context';
import { plainLength } from '../page/lengths';
import { axisOver, type Profile as ProfileData, profileOf, voltsRange } from './profile';
import styles from './profile.module.css';

/** The run whose volts are shown: that of what is chosen, else the last one shown, else the first. */
function useShownRun(): RunRecord | undefined {
  const editor = useEditor();
  const doc = useDoc();
  const selection = useSession((s) => s.selection);
  const runId = useSession((s) => s.runId);
  const ofChoice = useMemo(() => {
    const byNode = runOfNodes(doc);
    for (const id of selection) {
      const record = doc.get(id);
      const run = record?.kind === 'run' ? id : record?.kind === 'cable' ? record.runId : byNode.get(id);
      if (run !== undefined && run !== null && record?.kind !== 'transformer') return run;
    }
    return null;
  }, [doc, selection]);
  useEffect(() => {
    if (ofChoice !== null) editor.session.setState({ runId: ofChoice });
  }, [editor, ofChoice]);
  const shown = recordOf(doc, ofChoice ?? runId, 'run');
  return shown ?? [...recordsOf(doc, 'run')].sort((a, b) => a.number - b.number)[0];
}

export function Profile() {
  const editor = useEditor();
  const doc = useDoc();
  const system = useUnitSystem();
  const answers = useEstimate((s) => s.answers);
  const lengths = useEstimate((s) => s.lengths);
  const stale = useEstimate((s) => s.stale);
  const run = useShownRun();
  const [asTable, setAsTable] = useState(false);
  const profile = useMemo(
    () => (run === undefined || answers === null ? null : profileOf(doc, run.id, answers, lengths)),
    [doc, run, answers, lengths],
  );
  const reading = run === undefined ? undefined : answers?.runs.get(run.id);
  const runs = [...recordsOf(doc, 'run')].sort((a, b) => a.number - b.number);
  return (
    <section className={styles.profile} aria-labelledby="profile-title" data-stale={stale || undefined}>
      <header className={styles.head}>
        <h2 id="profile-title">
          {run === undefined ? 'Profile' : `Run ${run.number}`}
          {run !== undefined && reading !== undefined && profile !== null && (
            <span className={styles.facts}>
              volts along {plainLength(profile.lengthMeters, system)}, from{' '}
              {voltsText(reading.terminalVolts, null)} · {ampsText(reading.amps)} ·{' '}
              {voltAmpsText(reading.voltAmps)}
            </span>
          )}
        </h2>
        {runs.length > 1 && (
          <select
            aria-label="Run to show"
            className={styles.runs}
            value={run?.id ?? ''}
            onChange={(event) => {
              editor.select([]);
              editor.session.setState({ runId: event.target.value });
            }}
          >
            {runs.map((r) => (
              <option key={r.id} value={r.id}>
                Run {r.number} {r.name}
              </option>
            ))}
          </select>
        )}
        {profile !== null && (
          <button
            type="button"
            className={styles.swap}
            aria-pressed={asTable}
            onClick={() => setAsTable(!asTable)}
          >
            As a table
          </button>
        )}
      </header>
      {profile === null || reading === undefined ? (
        <p className={styles.empty}>
          {runs.length === 0
            ? 'Draw cable from the transformer to a fixture, and its volts show here.'
            : 'The volts of this run are not known yet.'}
        </p>
      ) : asTable ? (
        <ProfileTable profile={profile} system={system} />
      ) : (
        <Chart
          profile={profile}
          terminalVolts={reading.terminalVolts}
          system={system}
          label={`Run ${run?.number}`}
        />
      )}
    </section>
  );
}

function ProfileTable({ profile, system }: { readonly profile: ProfileData; readonly system: UnitSystem }) {
  const editor = useEditor();
  return (
    <div className={styles.scroll}>
      <table className={styles.table}>
        <thead>
          <tr>
            <th scope="col">Fixture</th>
            <th scope="col">Cable from the transformer</th>
            <th scope="col">Volts</th>
            <th scope="col">State</th>
          </tr>
        </thead>
        <tbody>
          {profile.points.map((p) => (
            <tr key={p.id}>
              <th scope="row">
                <button type="button" className={styles.link} onClick={() => editor.reveal(p.id)}>
                  {p.tag} {p.name}
                </button>
              </th>
              <td>{plainLength(p.meters, system)}</td>
              <td>{voltsText(p.volts, profile.band)}</td>
              <td>{lookWord(p.look.kind)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

interface ChartProps {
  readonly profile: ProfileData;
  readonly terminalVolts: number;
  readonly system: UnitSystem;
  readonly label: string;
}

const LEFT = 56;
const RIGHT = 64;
const TOP = 14;
const BOTTOM = 26;

function Chart({ profile, terminalVolts, system, label }: ChartProps) {
  const editor = useEditor();
  const hoveredId = useSession((s) => s.hoveredId);
  const selection = useSession((s) => s.selection);
  const frame = useRef<HTMLDivElement>(null);
  const [size, setSize] = useState({ width: 0, height: 0 });
  useEffect(() => {
    const element = frame.current;
    if (element === null) return;
    const observer = new ResizeObserver(() =>
      setSize({ width: element.clientWidth, height: element.clientHeight }),
    );
    observer.observe(element);
    return () => observer.disconnect();
  }, []);

  const unit = system === 'imperial' ? METERS_PER_FOOT : 1;
  const { low, high } = voltsRange(profile, terminalVolts);
  const xAxis = axisOver(0, Math.max(profile.farthestMeters / unit, 1), size.width < 500 ? 4 : 7);
  const yAxis = axisOver(low, high, size.height < 130 ? 2 : 4);
  const plotWidth = Math.max(1, size.width - LEFT - RIGHT);
  const plotHeight = Math.max(1, size.height - TOP - BOTTOM);
  const x = (m: number) => LEFT + (m / unit / xAxis.to) * plotWidth;
  const y = (v: number) => TOP + ((yAxis.to - v) / (yAxis.to - yAxis.from)) * plotHeight;
  const clamp = (v: number) => Math.min(yAxis.to, Math.max(yAxis.from, v));
  const { band } = profile;
  const digits = yAxis.ticks.some((t) => !Number.isInteger(t)) ? 1 : 0;

  return (
    <div ref={frame} className={styles.chart}>
      {size.width > 0 && (
        <svg
          width={size.width}
          height={size.height}
          role="img"
          aria-label={`${label}: volts against distance. The same figures are in the table.`}
        >
          {band !== null && clamp(band.minVolts) < clamp(band.maxVolts) && (
            <g>
              <rect
                className={styles.band}
                x={LEFT}
                width={plotWidth}
                y={y(clamp(band.maxVolts))}
                height={y(clamp(band.minVolts)) - y(clamp(band.maxVolts))}
              />
              {[band.minVolts, band.maxVolts].map(
                (edge) =>
                  edge >= yAxis.from &&
                  edge <= yAxis.to && (
                    <g key={edge}>
                      <line
                        className={styles.edge}
                        x1={LEFT}
                        x2={LEFT + plotWidth}
                        y1={y(edge)}
                        y2={y(edge)}
                      />
                      <text
                        className={styles.quiet}
                        x={LEFT + plotWidth + 6}
                        y={y(edge)}
                        dominantBaseline="middle"
                      >
                        {edge.toFixed(1)} V
                      </text>
                    </g>
                  ),
              )}
            </g>
          )}
          {yAxis.ticks.map((t) => (
            <text
              key={t}
              className={styles.quiet}
              x={LEFT - 10}
              y={y(t)}
              textAnchor="end"
              dominantBaseline="middle"
            >
              {t.toFixed(digits)} V
            </text>
          ))}
          {xAxis.ticks.map((t) => (
            <text key={t} className={styles.quiet} x={x(t * unit)} y={size.height - 6} textAnchor="middle">
              {Number(t.toFixed(1))} {system === 'imperial' ? 'ft' : 'm'}
            </text>
          ))}
          {profile.lines.map((line) => (
            <line
              key={line.cableId}
              className={styles.line}
              data-on={selection.has(line.cableId) || hoveredId === line.cableId || undefined}
              x1={x(line.from.meters)}
              y1={y(clamp(line.from.volts))}
              x2={x(line.to.meters)}
              y2={y(clamp(line.to.volts))}
            />
          ))}
          {profile.points.map((p) => {
            const lit = hoveredId === p.id || selection.has(p.id);
            return (
              <g
                key={p.id}
                transform={`translate(${x(p.meters)} ${y(clamp(p.volts))})`}
                onPointerEnter={() => editor.hover(p.id)}
                onPointerLeave={() => editor.hover(null)}
                onPointerDown={() => editor.reveal(p.id)}
              >
                <circle r="13" fill="transparent" />
                <g transform="scale(0.8)">
                  <FixtureGlyphShape look={p.look} />
                </g>
                {lit && <circle className={styles.ring} r="11.5" />}
                {hoveredId === p.id && (
                  <text className={styles.tip} y={-18} textAnchor="middle">
                    {p.tag} {voltsText(p.volts, band)}
                  </text>
                )}
              </g>
            );
          })}
        </svg>
      )}
    </div>
  );
}
