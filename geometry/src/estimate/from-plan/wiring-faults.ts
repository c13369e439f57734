import {
  feedingRuns,
  initialOf,
  itemOf,
  labelOf,
  type Network,
  networks,
  type PlanDocument,
  type RunRecord,
  recordOf,
  recordsOf,
  sourceTransformerId,
} from '../../plan/index.js';
import type { PlanFault } from './fault.js';
import { capitalised, listed } from './words.js';

/** What the wiring itself says: needs no volts and no lengths. */
export function wiringFaults(doc: PlanDocument): PlanFault[] {
  return [
    ...networks(doc).flatMap((network) => networkFaults(doc, network)),
    ...crowdedTerminals(doc),
    ...direct(doc),
    ...numbersUsedTwice(doc),
  ];
}

function networkFaults(doc: PlanDocument, network: Network): PlanFault[] {
  const transformers = new Set(network.attachments.map((a) => a.transformerId));
  const runs = feedingRuns(doc, network);
  const [first, second] = runs;
  if (transformers.size > 1) {
    const labels = [...transformers].flatMap((id) => {
      const record = doc.get(id);
      return record ? [labelOf(record, doc)] : [];
    });
    const cable = network.attachments[0]?.cableId ?? '';
    return [
      {
        code: 'joined-transformers',
        severity: 'fault',
        recordId: first?.id ?? cable,
        otherId: second?.id ?? null,
        message: `Cable joins ${listed(labels)}: one would feed back through the other. Cut it between them.`,
      },
    ];
  }
  if (first && second) return [joined(doc, first, second, runs)];
  return loopFaults(doc, network, first);
}

/** Two people may each do their part of a join that neither could have made alone. */
function joined(
  doc: PlanDocument,
  first: RunRecord,
  second: RunRecord,
  runs: readonly RunRecord[],
): PlanFault {
  const alike = runs.every(
    (run) => run.tapId === first.tapId && windingOf(doc, run) === windingOf(doc, first),
  );
  const labels = listed(runs.map((record) => labelOf(record, doc)));
  return {
    code: 'joined-runs',
    severity: alike ? 'caution' : 'fault',
    recordId: first.id,
    otherId: second.id,
    message: alike
      ? `${capitalised(labels)} are joined by cable: make them one run, marked to marked.`
      : `${capitalised(labels)} are joined by cable, but are on different taps or windings: that shorts them. Cut it between them.`,
  };
}

/** Every independent loop must be closed by a cable that somebody confirmed marked-to-marked. */
function loopFaults(doc: PlanDocument, network: Network, run: RunRecord | undefined): PlanFault[] {
  const nodes = network.nodes.length + (network.attachments.length > 0 ? 1 : 0);
  const loops = network.cables.length - nodes + 1;
  const confirmed = network.cables.filter((cable) => cable.markedToMarked).length;
  if (loops <= confirmed) return [];
  return [
    {
      code: 'loop-not-confirmed',
      severity: 'caution',
      recordId: run?.id ?? network.cables[0]?.id ?? '',
      otherId: null,
      message: `${run ? `${capitalised(labelOf(run, doc))} closes a loop` : 'Cable closes a loop'} that nobody has confirmed marked-to-marked. Check it with a meter before closing.`,
    },
  ];
}

function windingOf(doc: PlanDocument, run: RunRecord): string | undefined {
  const transformer = recordOf(doc, run.transformerId, 'transformer');
  const item = itemOf(doc, transformer?.itemId ?? null, 'transformer');
  return item?.terminals.find((t) => t.type === 'common' && t.id === run.commonId)?.winding;
}

function crowdedTerminals(doc: PlanDocument): PlanFault[] {
  const landed = new Map<string, number>();
  for (const cable of recordsOf(doc, 'cable')) {
    const run = recordOf(doc, cable.runId, 'run');
    if (!run) continue;
    for (const end of [cable.fromId, cable.toId])
      if (sourceTransformerId(doc.get(end)) === run.transformerId)
        for (const terminal of [run.tapId, run.commonId]) {
          const key = `${run.transformerId} ${terminal}`;
          landed.set(key, (landed.get(key) ?? 0) + 1);
        }
  }
  const faults: PlanFault[] = [];
  for (const transformer of recordsOf(doc, 'transformer'))
    for (const { id, type, maxConductors } of itemOf(doc, transformer.itemId, 'transformer')?.terminals ??
      []) {
      const count = landed.get(`${transformer.id} ${id}`) ?? 0;
      if (count > maxConductors)
        faults.push({
          code: 'terminal-crowded',
          severity: 'caution',
          recordId: transformer.id,
          otherId: null,
          message: `${capitalised(type)} ${id} of ${labelOf(transformer, doc)} holds ${maxConductors} conductors; ${count} are landed on it. Splice them outside, or use another.`,
        });
    }
  return faults;
}

function direct(doc: PlanDocument): PlanFault[] {
  return [...recordsOf(doc, 'transformer')]
    .filter((t) => itemOf(doc, t.itemId, 'transformer')?.supply === 'dc')
    .map((t) => ({
      code: 'dc-polarity',
      severity: 'advice',
      recordId: t.id,
      otherId: null,
      message: `${capitalised(labelOf(t, doc))} gives DC: polarity matters at every fixture, marked conductor to the common.`,
    }));
}

/** Two people who place things at the same time may give the same number. */
function numbersUsedTwice(doc: PlanDocument): PlanFault[] {
  const kinds = ['transformer', 'fixture', 'junction', 'run'] as const;
  return kinds.flatMap((kind) => {
    const byNumber = new Map<string, string>();
    const faults: PlanFault[] = [];
    for (const record of recordsOf(doc, kind)) {
      // Fixtures are counted by their letter: P1 and U1 are two numbers.
      const number = `${record.kind === 'fixture' ? initialOf(doc, record) : ''}${record.number}`;
      const other = byNumber.get(number);
      if (other === undefined) byNumber.set(number, record.id);
      else
        faults.push({
          code: 'number-used-twice',
          severity: 'advice',
          recordId: record.id,
          otherId: other,
          message: `Number ${number} is used twice among the ${kind}s; give one another number.`,
        });
    }
    return faults;
  });
}
