import {
  fromLuxUnit,
  inLuxUnit,
  type LuxUnit,
  lengthOf,
  luxText,
  luxUnitText,
  type NoProposal,
  type Proposal,
  USUAL_TREE_LUX,
  USUAL_WALL_LUX,
} from '@lampwright/geometry/light';
import { type PlanDocument, recordOf } from '@lampwright/geometry/plan';
import { useEffect, useMemo, useState } from 'react';
import { Button } from '../../../components/button';
import { LightTargetFields } from '../inspector/LightTargetFields';
import { useDoc, useEditor, useSession, useUnitSystem } from '../page/context';
import { CommitField, LengthField, SelectField } from '../page/controls';
import type { CatalogueEntry } from '../page/items';
import { PanelFrame } from '../page/PanelFrame';
import type { LightsToPlace } from '../tools/proposed';
import { placeLights } from './place-lights';
import styles from './placing.module.css';
import {
  askingFor,
  choicesFor,
  firstWish,
  hasHouse,
  keyOf,
  kindOf,
  type Lightable,
  lightableOf,
  offersOf,
  type SeenFrom,
  type Wish,
} from './subject';
import { type Proposed, useProposal } from './use-proposal';

/** More lights than this are placed in several goes. */
const MOST_LIGHTS = 200;
/** Nothing in a garden is wider. */
const WIDEST_PATH_METERS = 20;
const MOST_LUX = 10_000;

/** Lights proposed for a path, a tree or a wall: what, where and why; they can be changed, then placed. */
export function PlacingPanel({ entries }: { readonly entries: readonly CatalogueEntry[] }) {
  const editor = useEditor();
  const doc = useDoc();
  const sheetId = useSession((s) => s.sheetId);
  const id = useSession((s) => s.placingId);
  const record = lightableOf(doc, id);
  const elsewhere = record !== undefined && record.sheetId !== sheetId;
  useEffect(() => {
    if (elsewhere) editor.session.setState({ panel: 'none' });
  }, [editor, elsewhere]);
  if (elsewhere) return null;
  if (record === undefined)
    return (
      <PanelFrame title="Lights proposed" side="start">
        <p role="status">What was to be lit is not on the plan any more.</p>
      </PanelFrame>
    );
  return <Placing key={record.id} record={record} entries={entries} />;
}

interface PlacingProps {
  readonly record: Lightable;
  readonly entries: readonly CatalogueEntry[];
}

function Placing({ record, entries }: PlacingProps) {
  const editor = useEditor();
  const doc = useDoc();
  const system = useUnitSystem();
  const light: LuxUnit = system === 'imperial' ? 'foot-candle' : 'lux';
  const [wish, setWish] = useState(() => firstWish(doc, record));
  const offers = useMemo(() => offersOf(entries), [entries]);
  const asking = useMemo(
    () => askingFor(doc, record, wish, offers, { system, light }),
    [doc, record, wish, offers, system, light],
  );
  const proposed = useProposal(asking);
  const set = (fields: Partial<Wish>) => setWish({ ...wish, ...fields });
  const title = `Light this ${kindOf(record)}`;
  const side = useSession((s) => s.placingSide);
  switch (asking.is) {
    case 'no-scale':
      return (
        <PanelFrame title={title} side={side}>
          <p role="status">How much light falls where waits for this sheet’s scale.</p>
          <div>
            <Button kind="strong" onClick={() => editor.use('scale')}>
              Set the scale
            </Button>
          </div>
        </PanelFrame>
      );
    case 'impossible':
      return (
        <PanelFrame title={title} side={side}>
          <p role="status">{asking.message}</p>
        </PanelFrame>
      );
    case 'ask':
      return (
        <PanelFrame title={title} side={side}>
          <Result proposed={proposed} light={light} />
          <Fields
            record={record}
            wish={wish}
            set={set}
            result={proposed.result}
            choices={choicesFor(record, offers)}
            length={lengthToLight(asking.ask.toLight)}
            light={light}
          />
          <Take proposed={proposed} />
        </PanelFrame>
      );
  }
}

type ToLight = Extract<ReturnType<typeof askingFor>, { is: 'ask' }>['ask']['toLight'];

/** Metres along which lights stand; null where they stand around something. */
function lengthToLight(toLight: ToLight): number | null {
  switch (toLight.kind) {
    case 'path':
      return lengthOf(toLight.line);
    case 'wall':
      return lengthOf(toLight.foot);
    case 'tree':
      return null;
  }
}

const percent = (share: number): string => `${Math.round(100 * share)} %`;

/** What is proposed, what light it gives, and why this. */
function Result({ proposed, light }: { readonly proposed: Proposed; readonly light: LuxUnit }) {
  const { result, working, problem, retry } = proposed;
  if (problem !== null)
    return (
      <div role="alert">
        <p>The proposal could not be worked out: {problem}</p>
        <Button onClick={retry}>Try again</Button>
      </div>
    );
  return (
    <div role="status" aria-busy={working} className={styles.result} data-stale={working || undefined}>
      {result === null && <p>Working out what fits…</p>}
      {result?.kind === 'refused' && <p>{result.message}</p>}
      {result?.kind === 'proposal' && <Found proposal={result} light={light} />}
    </div>
  );
}

const place: Readonly<Record<NonNullable<Proposal['figures']>['on'], string>> = {
  path: 'on the path',
  crown: 'on the lit side of the crown',
  wall: 'on the wall',
};

function Found({ proposal, light }: { readonly proposal: Proposal; readonly light: LuxUnit }) {
  const { figures, why, short } = proposal;
  return (
    <>
      {figures !== null && (
        <dl className={styles.figures}>
          <div>
            <dt>Mean {place[figures.on]}</dt>
            <dd>{luxText(figures.meanLux, light)}</dd>
          </div>
          {figures.leastLux !== null && (
            <div>
              <dt>Darkest place</dt>
              <dd>{luxText(figures.leastLux, light)}</dd>
            </div>
          )}
          {figures.evenness !== null && (
            <div>
              <dt>Darkest to mean</dt>
              <dd>{percent(figures.evenness)}</dd>
            </div>
          )}
        </dl>
      )}
      {short.length === 0 ? (
        <p className={styles.met}>It gives the light that is wanted.</p>
      ) : (
        short.map((sentence) => (
          <p key={sentence} className={styles.short}>
            {sentence}
          </p>
        ))
      )}
      {why.map((sentence) => (
        <p key={sentence}>{sentence}</p>
      ))}
      <p className={styles.quiet}>Worked out by these lights alone, at their rated volts.</p>
    </>
  );
}

interface FieldsProps {
  readonly record: Lightable;
  readonly wish: Wish;
  readonly set: (fields: Partial<Wish>) => void;
  readonly result: Proposal | NoProposal | null;
  readonly choices: readonly { readonly key: string; readonly name: string }[];
  readonly length: number | null;
  readonly light: LuxUnit;
}

function Fields({ record, wish, set, result, choices, length, light }: FieldsProps) {
  const doc = useDoc();
  const proposal = result?.kind === 'proposal' ? result : null;
  const count = wish.count ?? proposal?.lights.length ?? null;
  // So many of what is shown: another item would not be what the number was chosen for.
  const setCount = (next: number) =>
    set({ count: next, candidateKey: wish.candidateKey ?? (proposal && keyOf(proposal)) });
  return (
    <>
      <fieldset className={styles.part}>
        <legend>Lights</legend>
        <SelectField
          label="Item"
          value={wish.candidateKey ?? ''}
          none="The one that fits best"
          options={choices.map(({ key, name }) => ({ value: key, label: name }))}
          onChange={(key) => set({ candidateKey: key === '' ? null : key })}
        />
        <CommitField
          label="How many"
          value={count === null ? '' : `${count}`}
          inputMode="decimal"
          commit={(text) => {
            const next = Number(text.trim());
            if (!Number.isInteger(next) || next < 1 || next > MOST_LIGHTS)
              return `A whole number from 1 to ${MOST_LIGHTS}.`;
            setCount(next);
            return null;
          }}
        />
        {length !== null && length > 0 && (
          <LengthField
            label="Apart"
            value={count === null ? null : length / count}
            hint="Spread evenly, no farther apart than this."
            check={(meters) =>
              meters === 0 || Math.ceil(length / meters - 1e-6) > MOST_LIGHTS
                ? `That would be more than ${MOST_LIGHTS} lights.`
                : null
            }
            commit={(meters) => {
              if (meters !== null) setCount(Math.max(Math.ceil(length / meters - 1e-6), 1));
            }}
          />
        )}
        <Where record={record} wish={wish} set={set} hasHouse={hasHouse(doc, record.sheetId)} />
        {(wish.count !== null || wish.candidateKey !== null) && (
          <div>
            <Button onClick={() => set({ count: null, candidateKey: null })}>As proposed</Button>
          </div>
        )}
      </fieldset>
      {record.kind === 'measurement' ? (
        <LightTargetFields target={wish.target} commit={(target) => set({ target })} />
      ) : (
        <WantedLux
          lux={wish.wantedLux}
          usual={record.kind === 'tree' ? USUAL_TREE_LUX : USUAL_WALL_LUX}
          unit={light}
          commit={(wantedLux) => set({ wantedLux })}
        />
      )}
    </>
  );
}

interface WhereProps extends Pick<FieldsProps, 'record' | 'wish' | 'set'> {
  readonly hasHouse: boolean;
}

/** On which side lights stand. */
function Where({ record, wish, set, hasHouse: house }: WhereProps) {
  const doc = useDoc();
  switch (record.kind) {
    case 'measurement':
      return (
        <>
          <SelectField
            label="Stand"
            value={wish.arrangement}
            options={[
              { value: 'alternating', label: 'On both sides in turn' },
              { value: 'left', label: 'On the left' },
              { value: 'right', label: 'On the right' },
            ]}
            onChange={(value) =>
              set({ arrangement: value === 'left' || value === 'right' ? value : 'alternating' })
            }
          />
          <LengthField
            label="Path width"
            value={wish.widthMeters}
            check={(meters) =>
              meters === 0 || meters > WIDEST_PATH_METERS
                ? `A width of at most ${WIDEST_PATH_METERS} m.`
                : null
            }
            commit={(widthMeters) => {
              if (widthMeters !== null) set({ widthMeters });
            }}
          />
        </>
      );
    case 'tree':
      return (
        <SelectField
          label="Seen from"
          value={wish.seenFrom}
          options={seenFromOptions(doc, record.sheetId, house)}
          onChange={(value) => set({ seenFrom: value === 'viewer' || value === 'house' ? value : 'around' })}
        />
      );
    case 'face':
      return (
        <SelectField
          label="Side"
          value={wish.side}
          options={[
            { value: 'front', label: 'The side that is seen' },
            { value: 'back', label: 'The other side' },
          ]}
          onChange={(value) => set({ side: value === 'back' ? 'back' : 'front' })}
        />
      );
  }
}

function seenFromOptions(
  doc: PlanDocument,
  sheetId: string,
  house: boolean,
): { value: SeenFrom; label: string }[] {
  return [
    ...(recordOf(doc, sheetId, 'sheet')?.view === 'photo'
      ? [{ value: 'viewer' as const, label: 'Where the photo was taken' }]
      : []),
    ...(house ? [{ value: 'house' as const, label: 'The house' }] : []),
    { value: 'around', label: 'All around' },
  ];
}

interface WantedLuxProps {
  readonly lux: number | null;
  readonly usual: number;
  readonly unit: LuxUnit;
  readonly commit: (lux: number | null) => void;
}

function WantedLux({ lux, usual, unit, commit }: WantedLuxProps) {
  return (
    <fieldset className={styles.part}>
      <legend>Light wanted</legend>
      <CommitField
        label="Mean"
        unit={luxUnitText(unit)}
        value={lux === null ? '' : `${Number(inLuxUnit(lux, unit).toPrecision(3))}`}
        placeholder={`${Number(inLuxUnit(usual, unit).toPrecision(2))}, as usual`}
        inputMode="decimal"
        commit={(text) => {
          if (text.trim() === '') {
            commit(null);
            return null;
          }
          const typed = fromLuxUnit(Number(text.trim().replace(',', '.')), unit);
          if (!(typed > 0 && typed <= MOST_LUX)) return 'More light than none, and less than by day.';
          commit(typed);
          return null;
        }}
      />
    </fieldset>
  );
}

const lightsInWords = (count: number): string => (count === 1 ? '1 light' : `${count} lights`);

/** Places the lights that are shown, or says why none can be. */
function Take({ proposed: { result, placing, working } }: { readonly proposed: Proposed }) {
  const editor = useEditor();
  if (result?.kind !== 'proposal') return null;
  const shown = placing?.lights.length ?? result.lights.length;
  const hidden = result.lights.length - shown;
  const take = (lights: LightsToPlace) => {
    const words = lightsInWords(lights.lights.length);
    if (!editor.edit(`Place ${words}`, (doc) => placeLights(doc, lights), false)) return;
    editor.session.setState({
      panel: 'none',
      placingId: null,
      message: `${words} placed and chosen. Draw cable to ${lights.lights.length === 1 ? 'it' : 'them'} next.`,
    });
  };
  return (
    <div className={styles.take}>
      {hidden > 0 && (
        <p>
          {lightsInWords(hidden)} would stand where this sheet shows no ground, and{' '}
          {hidden === 1 ? 'is' : 'are'} left out.
        </p>
      )}
      {shown > 0 && (
        <Button
          kind="strong"
          wide
          busy={working || placing === null}
          onClick={() => {
            if (placing !== null) take(placing);
          }}
        >
          Place {lightsInWords(shown)}
        </Button>
      )}
    </div>
  );
}
