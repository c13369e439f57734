import { usualMountingHeight } from '@lampwright/geometry/light';
import { type FixtureRecord, itemOf, putRecords, setFields } from '@lampwright/geometry/plan';
import { useMemo } from 'react';
import { useDoc, useEditor, useScale, useUnitSystem } from '../page/context';
import { CommitField, LengthField, SelectField } from '../page/controls';
import { plainLength } from '../page/lengths';
import { type AimFigures, aimFigures, aimWith } from '../tools/aim-fields';
import { aimInWords } from './aim-words';
import styles from './inspector.module.css';
import { common, idsOf, tooHigh } from './shared';

const kinds = [
  { value: 'usual', label: 'As usual for its kind' },
  { value: 'tilt', label: 'By direction and tilt' },
  { value: 'point', label: 'At a place' },
] as const;

/** Degrees as people write them; null where that is none. */
function readDegrees(text: string, most: number): number | null {
  const degrees = Number(text.trim().replace(',', '.').replace(/°$/, ''));
  return text.trim() !== '' && Number.isFinite(degrees) && degrees >= 0 && degrees <= most ? degrees : null;
}

/** Where fixtures point, in words and figures, and how high they stand. All that are chosen are changed together. */
export function AimFields({ fixtures }: { readonly fixtures: readonly FixtureRecord[] }) {
  const editor = useEditor();
  const doc = useDoc();
  const scale = useScale();
  const system = useUnitSystem();
  const locked = !editor.canEdit;
  const figures = useMemo(
    () =>
      fixtures.flatMap((fixture) => {
        const world = { doc: () => doc, sheetId: () => fixture.sheetId, scale: () => scale };
        const of = aimFigures(world, fixture);
        return of === null ? [] : [of];
      }),
    [doc, scale, fixtures],
  );
  const known = figures.length === fixtures.length;
  const kind = common(fixtures, (f) => f.aim?.kind ?? 'usual');

  const change = (label: string, patch: Partial<AimFigures>): void => {
    editor.edit(label, (d) =>
      putRecords(
        d,
        fixtures.flatMap((fixture) => {
          const world = { doc: () => d, sheetId: () => fixture.sheetId, scale: () => scale };
          const aim = aimWith(world, fixture, patch);
          return aim === undefined ? [] : [{ ...fixture, aim }];
        }),
      ),
    );
  };
  const degrees = (of: (f: AimFigures) => number | null): string => {
    const value = common(figures, of);
    return value === undefined || value === null ? '' : `${Math.round(value * 10) / 10}`;
  };
  const several = fixtures.length > 1 ? 'several' : undefined;

  return (
    <fieldset className={styles.part}>
      <legend>Aim</legend>
      {known && figures.length === 1 && <p className={styles.facts}>{aimInWords(figures[0]!, system)}</p>}
      {!known && (
        <p className={styles.facts}>
          {scale === null
            ? 'Directions wait for the sheet’s scale.'
            : 'Without its lamp there is nothing to aim yet.'}
        </p>
      )}
      <SelectField
        label="Points"
        value={kind ?? ''}
        mixed={kind === undefined}
        disabled={locked || (!known && kind === 'usual')}
        options={kinds}
        onChange={(value) => {
          const next = kinds.find((k) => k.value === value);
          if (next !== undefined) change('Aim', { kind: next.value });
        }}
      />
      {known && (kind === 'tilt' || kind === 'point') && (
        <CommitField
          label="Direction"
          unit="°"
          value={degrees((f) => f.direction)}
          placeholder={several}
          inputMode="decimal"
          disabled={locked}
          hint="Clockwise; 0 is straight up the sheet."
          commit={(text) => {
            const direction = readDegrees(text, 360);
            if (direction === null) return 'Degrees from 0 to 360.';
            change('Aim', { direction: direction % 360 });
            return null;
          }}
        />
      )}
      {known && kind === 'tilt' && (
        <CommitField
          label="Tilt"
          unit="°"
          value={degrees((f) => f.degreesFromDown)}
          placeholder={several}
          inputMode="decimal"
          disabled={locked}
          hint="From straight down: 90 is level, 180 straight up."
          commit={(text) => {
            const degreesFromDown = readDegrees(text, 180);
            if (degreesFromDown === null) return 'Degrees from 0 to 180.';
            change('Aim', { degreesFromDown });
            return null;
          }}
        />
      )}
      {known && kind === 'point' && (
        <>
          <LengthField
            label="Distance"
            value={common(figures, (f) => f.distanceMeters) ?? null}
            mixed={common(figures, (f) => f.distanceMeters) === undefined}
            disabled={locked}
            commit={(distanceMeters) => {
              if (distanceMeters !== null) change('Aim', { distanceMeters });
            }}
          />
          <LengthField
            label="Height"
            value={common(figures, (f) => f.heightMeters) ?? null}
            mixed={common(figures, (f) => f.heightMeters) === undefined}
            disabled={locked}
            check={tooHigh}
            commit={(heightMeters) => {
              if (heightMeters !== null) change('Aim', { heightMeters });
            }}
          />
        </>
      )}
      <MountingHeight fixtures={fixtures} />
    </fieldset>
  );
}

function MountingHeight({ fixtures }: { readonly fixtures: readonly FixtureRecord[] }) {
  const editor = useEditor();
  const doc = useDoc();
  const system = useUnitSystem();
  const height = common(fixtures, (f) => f.mountingHeightMeters);
  const usual = common(fixtures, (f) => {
    const item = itemOf(doc, f.itemId, 'fixture');
    return item === undefined ? null : (item.mountingHeightMeters ?? usualMountingHeight(item.kind));
  });
  return (
    <LengthField
      label="Stands"
      value={height ?? null}
      mixed={height === undefined}
      empty="null"
      placeholder={usual == null ? 'as usual' : `${plainLength(usual, system)}, as usual`}
      hint="The light itself, above the ground."
      disabled={!editor.canEdit}
      check={tooHigh}
      commit={(mountingHeightMeters) =>
        editor.edit('Change mounting height', (d) =>
          setFields(d, idsOf(fixtures), 'fixture', { mountingHeightMeters }),
        )
      }
    />
  );
}
