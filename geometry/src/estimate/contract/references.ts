import { type FaultList, shown } from './fault.js';
import { DEFAULT_WINDING_ID } from './normalize.js';
import { childOf, itemsOf, numberOf, textOf } from './untrusted.js';

/** What a transformer's names mean: tap and common ids with the winding that each belongs to. */
interface TerminalNames {
  readonly taps: ReadonlyMap<string, string | undefined>;
  readonly commons: ReadonlyMap<string, string | undefined>;
}

type Path = readonly PropertyKey[];

/**
 * Faults between parts of a request: repeated ids, names of things that are not there, tap and common of different
 * windings, cables that end where they start, runs of nothing, ranges upside down. Reads the value as it came, so
 * that it also says what can be said when other parts are malformed; parts of the wrong type are passed over, their
 * own fault is already named.
 */
export function findReferenceFaults(value: unknown, faults: FaultList): void {
  const transformers = new Map<string, TerminalNames>();
  itemsOf(childOf(value, 'transformers')).forEach((transformer, index) => {
    const path = ['transformers', index];
    const names = checkTransformer(transformer, path, faults);
    const id = textOf(childOf(transformer, 'id'));
    if (id === undefined) return;
    if (transformers.has(id)) faults.add([...path, 'id'], repeated('Transformer', id, 'the request'));
    else transformers.set(id, names);
  });
  const seen = { runs: new Set<string>(), cables: new Set<string>(), fixtures: new Set<string>() };
  itemsOf(childOf(value, 'runs')).forEach((run, index) => {
    const path = ['runs', index];
    checkRepeated(run, 'Run', path, seen.runs, 'the request', faults);
    checkTerminals(run, path, transformers, faults);
    checkCables(run, path, seen.cables, faults);
    checkFixtures(run, path, seen.fixtures, faults);
    const cables = childOf(run, 'cables');
    const fixtures = childOf(run, 'fixtures');
    if (Array.isArray(cables) && Array.isArray(fixtures) && cables.length + fixtures.length === 0) {
      faults.add(path, 'A run needs at least one cable or one fixture; this one has neither.');
    }
  });
}

function repeated(label: string, id: string, where: string): string {
  return `${label} id ${shown(id)} is used more than once in ${where}.`;
}

function checkRepeated(
  item: unknown,
  label: string,
  path: Path,
  seen: Set<string>,
  where: string,
  faults: FaultList,
): void {
  const id = textOf(childOf(item, 'id'));
  if (id === undefined) return;
  if (seen.has(id)) faults.add([...path, 'id'], repeated(label, id, where));
  seen.add(id);
}

function checkTransformer(transformer: unknown, path: Path, faults: FaultList): TerminalNames {
  const given = childOf(transformer, 'windings');
  const windings = new Set<string>();
  itemsOf(given).forEach((winding, index) => {
    checkRepeated(winding, 'Winding', [...path, 'windings', index], windings, 'its transformer', faults);
  });
  // A default winding has no name that the caller gave; naming one is a fault either way.
  const first = given === undefined ? DEFAULT_WINDING_ID : textOf(childOf(itemsOf(given)[0], 'id'));
  const readable = given === undefined || Array.isArray(given);
  const namesOf = (key: 'taps' | 'commons', label: string) => {
    const names = new Map<string, string | undefined>();
    itemsOf(childOf(transformer, key)).forEach((item, index) => {
      const itemPath = [...path, key, index];
      const named = childOf(item, 'winding');
      const winding = named === undefined ? first : textOf(named);
      if (readable && typeof named === 'string' && !windings.has(named)) {
        faults.add([...itemPath, 'winding'], `There is no winding ${shown(named)} in this transformer.`);
      }
      const id = textOf(childOf(item, 'id'));
      if (id === undefined) return;
      if (names.has(id)) faults.add([...itemPath, 'id'], repeated(label, id, 'its transformer'));
      else names.set(id, winding);
    });
    return names;
  };
  return { taps: namesOf('taps', 'Tap'), commons: namesOf('commons', 'Common') };
}

function checkTerminals(
  run: unknown,
  path: Path,
  transformers: ReadonlyMap<string, TerminalNames>,
  faults: FaultList,
): void {
  const transformerId = textOf(childOf(run, 'transformerId'));
  if (transformerId === undefined) return;
  const names = transformers.get(transformerId);
  if (!names) {
    faults.add([...path, 'transformerId'], `There is no transformer ${shown(transformerId)} in the request.`);
    return;
  }
  const tapId = textOf(childOf(run, 'tapId'));
  const commonId = textOf(childOf(run, 'commonId'));
  if (tapId !== undefined && !names.taps.has(tapId)) {
    faults.add([...path, 'tapId'], `There is no tap ${shown(tapId)} in transformer ${shown(transformerId)}.`);
  }
  if (commonId !== undefined && !names.commons.has(commonId)) {
    faults.add(
      [...path, 'commonId'],
      `There is no common ${shown(commonId)} in transformer ${shown(transformerId)}.`,
    );
  }
  if (tapId === undefined || commonId === undefined) return;
  const tapWinding = names.taps.get(tapId);
  const commonWinding = names.commons.get(commonId);
  if (tapWinding === undefined || commonWinding === undefined || tapWinding === commonWinding) return;
  faults.add(
    [...path, 'commonId'],
    `Common ${shown(commonId)} belongs to winding ${shown(commonWinding)}, tap ${shown(tapId)} to winding ` +
      `${shown(tapWinding)}; a run needs both from one winding.`,
  );
}

function checkCables(run: unknown, path: Path, seen: Set<string>, faults: FaultList): void {
  itemsOf(childOf(run, 'cables')).forEach((cable, index) => {
    const cablePath = [...path, 'cables', index];
    checkRepeated(cable, 'Cable', cablePath, seen, 'the request', faults);
    const from = textOf(childOf(cable, 'from'));
    if (from !== undefined && from === textOf(childOf(cable, 'to'))) {
      faults.add(
        [...cablePath, 'to'],
        `A cable must end at another node than it starts; got ${shown(from)} twice.`,
      );
    }
  });
}

function checkFixtures(run: unknown, path: Path, seen: Set<string>, faults: FaultList): void {
  itemsOf(childOf(run, 'fixtures')).forEach((fixture, index) => {
    const fixturePath = [...path, 'fixtures', index];
    checkRepeated(fixture, 'Fixture', fixturePath, seen, 'the request', faults);
    for (const key of ['window', 'target']) {
      const range = childOf(fixture, key);
      const low = numberOf(childOf(range, 'minVolts'));
      const high = numberOf(childOf(range, 'maxVolts'));
      if (low !== undefined && high !== undefined && low > high) {
        faults.add(
          [...fixturePath, key],
          `Lowest volts must not be above highest volts; got ${low} and ${high}.`,
        );
      }
    }
  });
}
