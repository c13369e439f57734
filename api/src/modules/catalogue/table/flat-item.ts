import {
  type CatalogueItem,
  type Conductor,
  catalogueItemSchema,
  fixtureKinds,
  type Load,
  type Terminal,
  type TransformerItem,
} from '@lampwright/geometry/catalogue';
import type { UnitSystem } from '@lampwright/geometry/units';
import { catalogueCategories } from '../catalogue.dto.js';
import { type CellFault, Cells, conductorText } from './cells.js';
import type { FieldName, FlatItem } from './fields.js';
import { cellSentence } from './sentences.js';

/** An item as texts by field, so that a table can hold it; `itemOfFlat` reads it back. */
export function flatOfItem(item: CatalogueItem): FlatItem {
  const common = { category: item.category, name: item.name, note: item.note ?? '' };
  switch (item.category) {
    case 'fixture':
      return {
        ...common,
        kind: item.kind,
        leadConductor: conductorText(item.lead.conductor),
        leadLength: `${item.lead.lengthMeters} m`,
        height: item.mountingHeightMeters === null ? '' : `${item.mountingHeightMeters} m`,
        shield: shieldText(item.shieldFactor ?? null),
        wetListed: yesNo(item.wetListed),
        light: item.light,
        ...(item.light === 'lamp'
          ? { base: item.base, maxWatts: numberText(item.maxWatts) }
          : flatOfLight(item)),
      };
    case 'lamp':
      return {
        ...common,
        base: item.base,
        technology: item.technology,
        life: numberText(item.lifeHours),
        ...flatOfLight(item),
      };
    case 'cable':
      return {
        ...common,
        conductor: conductorText(item.conductor),
        ampacity: numberText(item.ampacityAmps),
        directBurial: yesNo(item.directBurial),
      };
    case 'transformer':
      return {
        ...common,
        ratedVA: numberText(item.ratedVA),
        lineVolts: numberText(item.nominalLineVolts),
        regulation: numberText(item.regulationPercent),
        ratedAt: item.ratedAt,
        supply: item.supply,
        windings: item.windings.map(({ id, ratedVA }) => `${id} ${ratedVA} VA`).join('; '),
        terminals: item.terminals.map(terminalText).join('; '),
      };
    case 'hub':
      return { ...common, ways: numberText(item.ways) };
    case 'connector':
      return {
        ...common,
        minConductors: numberText(item.minConductors),
        maxConductors: numberText(item.maxConductors),
        largestAwg: numberText(item.largestAwg),
        smallestAwg: numberText(item.smallestAwg),
        directBurial: yesNo(item.directBurial),
      };
    case 'control':
      return {
        ...common,
        kind: item.kind,
        ratedVA: numberText(item.ratedVA),
        inrush: numberText(item.inrushAmps),
      };
    case 'part':
      return { ...common, use: item.use };
  }
}

interface Light {
  readonly load: Load;
  readonly window: { readonly minVolts: number; readonly maxVolts: number };
  readonly target: { readonly minVolts: number; readonly maxVolts: number } | null;
  readonly lumens: number | null;
  readonly beamDegrees: number | null;
  readonly cctKelvin: number | null;
  readonly peakCandela?: number | null | undefined;
  readonly smart?: boolean | undefined;
}

function flatOfLight(light: Light): FlatItem {
  const { load, window, target, lumens, beamDegrees, cctKelvin } = light;
  return {
    ...flatOfLoad(load),
    minVolts: numberText(window.minVolts),
    maxVolts: numberText(window.maxVolts),
    aimMin: numberText(target?.minVolts ?? null),
    aimMax: numberText(target?.maxVolts ?? null),
    lumens: numberText(lumens),
    beam: numberText(beamDegrees),
    cct: numberText(cctKelvin),
    peak: numberText(light.peakCandela ?? null),
    smart: light.smart === undefined ? '' : yesNo(light.smart),
  };
}

function flatOfLoad(load: Load): FlatItem {
  switch (load.kind) {
    case 'driver':
      return {
        loadKind: load.kind,
        watts: numberText(load.watts),
        powerFactor: numberText(load.powerFactor ?? null),
        driverVolts: numberText(load.minVolts),
      };
    case 'filament':
    case 'resistive':
      return { loadKind: load.kind, watts: numberText(load.watts), ratedVolts: numberText(load.ratedVolts) };
    case 'current':
      return { loadKind: load.kind, amps: numberText(load.amps) };
    case 'off':
      return { loadKind: load.kind };
  }
}

const yesNo = (value: boolean): string => (value ? 'yes' : 'no');
/** A share in per cent, without the digits that its binary form adds: 0.29 is 29. */
const shieldText = (share: number | null): string =>
  share === null ? '' : String(Number((share * 100).toPrecision(12)));
const numberText = (value: number | null): string => (value === null ? '' : String(value));

/** `tap 12V 12 V W1 10 A ×3`, `common C1 W1 ×3`: in their order, left to right, parted by semicolons. */
function terminalText(terminal: Terminal): string {
  const limit = terminal.limitAmps === null ? '' : ` ${terminal.limitAmps} A`;
  const volts = terminal.type === 'tap' ? ` ${terminal.volts} V` : '';
  return `${terminal.type} ${terminal.id}${volts} ${terminal.winding}${limit} ×${terminal.maxConductors}`;
}

export type FlatRead =
  | { readonly ok: true; readonly item: CatalogueItem }
  | { readonly ok: false; readonly faults: readonly CellFault[] };

/** Reads an item from its texts; every fault is told, by field. Bare lengths count in the given system. */
export function itemOfFlat(flat: FlatItem, system: UnitSystem): FlatRead {
  const cells = new Cells(flat, system);
  const category = cells.oneOf('category', catalogueCategories, null);
  const name = cells.needed('name', 'The name');
  const note = cells.text('note');
  if (!category) return { ok: false, faults: cells.faults };
  const rest = readers[category](cells);
  if (cells.faults.length > 0) return { ok: false, faults: cells.faults };
  const written = { category, name, ...(note === null ? {} : { note }), ...rest };
  const parsed = catalogueItemSchema.safeParse(written, { error: cellSentence });
  if (parsed.success) return { ok: true, item: parsed.data };
  return {
    ok: false,
    faults: parsed.error.issues.map(({ path, message }) => ({
      field: fieldOfPath(path.map(String)),
      detail: message,
    })),
  };
}

const usualWindow = { led: { minVolts: 9, maxVolts: 15 }, filament: { minVolts: 10.8, maxVolts: 12.6 } };

function lightOf(cells: Cells) {
  const loadKind = cells.oneOf('loadKind', ['driver', 'filament', 'resistive', 'current', 'off'], 'driver');
  const usual = loadKind === 'filament' || loadKind === 'resistive' ? usualWindow.filament : usualWindow.led;
  const minVolts = cells.number('minVolts') ?? usual.minVolts;
  const maxVolts = cells.number('maxVolts') ?? usual.maxVolts;
  const peak = cells.number('peak') ?? null;
  const smart = cells.text('smart') === null ? undefined : cells.boolean('smart', false);
  const aimMin = cells.number('aimMin') ?? null;
  const aimMax = cells.number('aimMax') ?? null;
  if ((aimMin === null) !== (aimMax === null))
    cells.fault(aimMin === null ? 'aimMin' : 'aimMax', 'The aim needs both its ends, or none.');
  return {
    load: loadKind && loadOf(cells, loadKind, minVolts),
    window: { minVolts, maxVolts },
    target: aimMin === null || aimMax === null ? null : { minVolts: aimMin, maxVolts: aimMax },
    lumens: cells.number('lumens'),
    beamDegrees: cells.number('beam'),
    cctKelvin: cells.number('cct'),
    ...(peak === null ? {} : { peakCandela: peak }),
    ...(smart === undefined ? {} : { smart }),
  };
}

function loadOf(cells: Cells, kind: Load['kind'], minVolts: number): Record<string, unknown> {
  switch (kind) {
    case 'driver': {
      const powerFactor = cells.number('powerFactor');
      return {
        kind,
        watts: cells.neededNumber('watts', 'The watts'),
        ...(powerFactor == null ? {} : { powerFactor }),
        minVolts: cells.number('driverVolts') ?? minVolts,
      };
    }
    case 'filament':
    case 'resistive':
      return {
        kind,
        watts: cells.neededNumber('watts', 'The watts'),
        ratedVolts: cells.number('ratedVolts') ?? 12,
      };
    case 'current':
      return { kind, amps: cells.neededNumber('amps', 'The amps') };
    case 'off':
      return { kind };
  }
}

/** A lead as fixtures of the trade commonly have it (common practice, no source), where the table says nothing. */
const usualLead = { conductor: { awg: 18 } as Conductor, lengthMeters: 0.9 };

const readers: Readonly<Record<CatalogueItem['category'], (cells: Cells) => Record<string, unknown>>> = {
  fixture: (cells) => {
    const shield = cells.number('shield') ?? null;
    const light = cells.oneOf('light', ['integrated', 'lamp'], cells.text('base') ? 'lamp' : 'integrated');
    return {
      kind: cells.oneOf('kind', fixtureKinds, null),
      lead: {
        conductor: cells.conductor('leadConductor') ?? usualLead.conductor,
        lengthMeters: cells.meters('leadLength') ?? usualLead.lengthMeters,
      },
      mountingHeightMeters: cells.meters('height'),
      ...(shield === null ? {} : { shieldFactor: shield / 100 }),
      wetListed: cells.boolean('wetListed', false),
      light,
      ...(light === 'lamp'
        ? { base: cells.needed('base', 'The base of its lamp'), maxWatts: cells.number('maxWatts') }
        : lightOf(cells)),
    };
  },
  lamp: (cells) => ({
    base: cells.needed('base', 'The base'),
    technology: cells.oneOf('technology', ['led', 'halogen', 'incandescent'], 'led'),
    lifeHours: cells.number('life'),
    ...lightOf(cells),
  }),
  cable: (cells) => ({
    conductor: cells.conductor('conductor') ?? cells.fault('conductor', 'The conductor is missing.'),
    ampacityAmps: cells.number('ampacity'),
    directBurial: cells.boolean('directBurial', true),
  }),
  transformer: (cells) => {
    const ratedVA = cells.neededNumber('ratedVA', 'The rating');
    return {
      ratedVA,
      nominalLineVolts: cells.neededNumber('lineVolts', 'The line volts'),
      regulationPercent: cells.number('regulation') ?? 0,
      ratedAt: cells.oneOf('ratedAt', ['open', 'load'], 'load'),
      supply: cells.oneOf('supply', ['ac', 'dc'], 'ac'),
      windings: windingsOf(cells, ratedVA ?? 0),
      terminals: terminalsOf(cells),
    };
  },
  hub: (cells) => ({ ways: cells.neededNumber('ways', 'The number of ways') }),
  connector: (cells) => ({
    minConductors: cells.number('minConductors') ?? 2,
    maxConductors: cells.neededNumber('maxConductors', 'The most conductors'),
    largestAwg: cells.neededNumber('largestAwg', 'The thickest gauge'),
    smallestAwg: cells.neededNumber('smallestAwg', 'The thinnest gauge'),
    directBurial: cells.boolean('directBurial', true),
  }),
  control: (cells) => ({
    kind: cells.oneOf('kind', ['timer', 'photocell', 'smart-plug'], null),
    ratedVA: cells.neededNumber('ratedVA', 'The rating'),
    inrushAmps: cells.number('inrush'),
  }),
  part: (cells) => ({
    use: cells.oneOf(
      'use',
      ['ground-stake', 'tree-mount', 'surface-mount', 'transformer-mount', 'conduit', 'other'],
      'other',
    ),
  }),
};

function windingsOf(cells: Cells, ratedVA: number): TransformerItem['windings'] | undefined {
  const text = cells.text('windings');
  if (text === null) return [{ id: 'W1', ratedVA }];
  const windings: TransformerItem['windings'] = [];
  for (const part of parts(text)) {
    const [, id, va] = /^(\S+)\s+(\d+(?:\.\d+)?)\s*VA$/i.exec(part) ?? [];
    if (id === undefined || va === undefined)
      return cells.fault('windings', `“${part}” is no winding; write W1 300 VA; W2 300 VA.`);
    windings.push({ id, ratedVA: Number(va) });
  }
  return windings;
}

function terminalsOf(cells: Cells): Terminal[] | undefined {
  const text = cells.needed('terminals', 'The row of terminals');
  if (text === undefined) return undefined;
  const terminals: Terminal[] = [];
  for (const part of parts(text)) {
    const match =
      /^(tap|common)\s+(\S+)(?:\s+(\d+(?:\.\d+)?)\s*V(?=\s|$))?(?:\s+(?!\d+(?:\.\d+)?\s*A(?:\s|$))(?![×x]\d)(\S+))?(?:\s+(\d+(?:\.\d+)?)\s*A)?(?:\s*[×x](\d+))?$/i.exec(
        part,
      );
    const [, type, id, volts, winding = 'W1', amps, conductors = '1'] = match ?? [];
    const common = {
      id: id ?? '',
      winding,
      limitAmps: amps === undefined ? null : Number(amps),
      maxConductors: Number(conductors),
    };
    if (type?.toLowerCase() === 'tap' && volts !== undefined)
      terminals.push({ type: 'tap', volts: Number(volts), ...common });
    else if (type?.toLowerCase() === 'common' && volts === undefined)
      terminals.push({ type: 'common', ...common });
    else
      return cells.fault(
        'terminals',
        `“${part}” is no terminal; write tap 12V 12 V W1 25 A ×3, or common C1 W1 25 A ×3.`,
      );
  }
  return terminals;
}

const parts = (text: string): string[] =>
  text
    .split(';')
    .map((part) => part.trim())
    .filter((part) => part !== '');

const fieldsByKey: Readonly<Record<string, FieldName>> = {
  name: 'name',
  note: 'note',
  kind: 'kind',
  base: 'base',
  maxWatts: 'maxWatts',
  lead: 'leadLength',
  mountingHeightMeters: 'height',
  shieldFactor: 'shield',
  lumens: 'lumens',
  beamDegrees: 'beam',
  cctKelvin: 'cct',
  peakCandela: 'peak',
  lifeHours: 'life',
  ampacityAmps: 'ampacity',
  ratedVA: 'ratedVA',
  nominalLineVolts: 'lineVolts',
  regulationPercent: 'regulation',
  windings: 'windings',
  terminals: 'terminals',
  ways: 'ways',
  minConductors: 'minConductors',
  maxConductors: 'maxConductors',
  largestAwg: 'largestAwg',
  smallestAwg: 'smallestAwg',
  inrushAmps: 'inrush',
};

/** The field that a fault of the item's schema is told at. */
function fieldOfPath([first = '', second = '']: readonly string[]): FieldName {
  if (first === 'window') return second === 'minVolts' ? 'minVolts' : 'maxVolts';
  if (first === 'target') return second === 'minVolts' ? 'aimMin' : 'aimMax';
  if (first === 'load')
    return second === 'powerFactor' ? 'powerFactor' : second === 'minVolts' ? 'driverVolts' : 'watts';
  return fieldsByKey[first] ?? 'name';
}
