import type { CatalogueCategory } from '@lampwright/geometry/catalogue';
import { byResistance, type Draft } from './draft';

/** An item that nobody has checked yet. */
type Unchecked = Readonly<Record<string, unknown>>;

/** A resistance leaves the choice of the gauge open; the schema then asks for the number. */
function conductor({ gauge, ohmsPerKm }: Draft): Unchecked {
  if (gauge === byResistance) return { ohmsPerKm };
  const [system, size] = gauge.split(' ');
  return system === 'mm2' ? { mm2: Number(size) } : { awg: Number(size) };
}

function load(draft: Draft): Unchecked {
  const { loadKind: kind, watts, powerFactor, loadMinVolts, ratedVolts, amps } = draft;
  switch (kind) {
    case 'driver':
      return { kind, watts, minVolts: loadMinVolts, ...(powerFactor === null ? {} : { powerFactor }) };
    case 'filament':
    case 'resistive':
      return { kind, watts, ratedVolts };
    case 'current':
      return { kind, amps };
    case 'off':
      return { kind };
  }
}

const light = (draft: Draft): Unchecked => ({
  load: load(draft),
  window: { minVolts: draft.windowMin, maxVolts: draft.windowMax },
  target: draft.hasAim ? { minVolts: draft.aimMin, maxVolts: draft.aimMax } : null,
  lumens: draft.lumens,
  beamDegrees: draft.beamDegrees,
  cctKelvin: draft.cctKelvin,
  ...(draft.peakCandela === null ? {} : { peakCandela: draft.peakCandela }),
  ...(draft.smart ? { smart: true } : {}),
});

const terminals = (draft: Draft): readonly Unchecked[] =>
  draft.terminals.map(({ volts, ...terminal }) =>
    terminal.type === 'tap' ? { ...terminal, volts } : terminal,
  );

function body(draft: Draft, category: CatalogueCategory): Unchecked {
  switch (category) {
    case 'fixture': {
      const { kind, mountingHeightMeters, shieldFactor, wetListed } = draft;
      const common = {
        kind,
        lead: { conductor: conductor(draft), lengthMeters: draft.leadLengthMeters },
        mountingHeightMeters,
        ...(shieldFactor === null ? {} : { shieldFactor }),
        wetListed,
      };
      return draft.light === 'integrated'
        ? { ...common, light: 'integrated', ...light(draft) }
        : { ...common, light: 'lamp', base: draft.base.trim(), maxWatts: draft.maxWatts };
    }
    case 'lamp': {
      const { technology, lifeHours } = draft;
      return { base: draft.base.trim(), technology, ...light(draft), lifeHours };
    }
    case 'cable': {
      const { ampacityAmps, directBurial } = draft;
      return { conductor: conductor(draft), ampacityAmps, directBurial };
    }
    case 'transformer': {
      const { ratedVA, nominalLineVolts, regulationPercent, ratedAt, windings, supply } = draft;
      return {
        ratedVA,
        nominalLineVolts,
        regulationPercent,
        ratedAt,
        // With a single winding there is nothing to divide: it carries the whole rating.
        windings: windings.length === 1 ? [{ id: windings[0]!.id, ratedVA }] : windings,
        terminals: terminals(draft),
        supply,
      };
    }
    case 'hub':
      return { ways: draft.ways };
    case 'connector': {
      const { minConductors, maxConductors, largestAwg, smallestAwg, directBurial } = draft;
      return { minConductors, maxConductors, largestAwg, smallestAwg, directBurial };
    }
    case 'control':
      return { kind: draft.controlKind, ratedVA: draft.ratedVA, inrushAmps: draft.inrushAmps };
    case 'part':
      return { use: draft.use };
  }
}

/** The item that a form stands for, to be checked by the catalogue's schema. */
export function itemOf(draft: Draft, category: CatalogueCategory): Unchecked {
  const note = draft.note.trim();
  return { category, name: draft.name, ...(note === '' ? {} : { note }), ...body(draft, category) };
}
