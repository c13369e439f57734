import {
  labelOf,
  lightOf,
  type PlanDocument,
  type RunRecord,
  recordOf,
  recordsOf,
  type TransformerRecord,
} from '../../plan/index.js';
import type { EstimateAnswer, EstimateWarning, FixtureAnswer } from '../contract/index.js';
import type { FaultSeverity, PlanFault, PlanFaultCode } from './fault.js';
import { capitalised, listed, voltsInWords } from './words.js';

/** What the solved volts say about the plan. */
export function voltFaults(doc: PlanDocument, answer: EstimateAnswer): PlanFault[] {
  return [
    ...answer.fixtures.flatMap((fixture) => fixtureFaults(doc, fixture)),
    ...answer.warnings.flatMap((warning) => warningFaults(doc, warning, answer)),
  ];
}

function fixtureFaults(doc: PlanDocument, answer: FixtureAnswer): PlanFault[] {
  const fixture = recordOf(doc, answer.id, 'fixture');
  const light = fixture && lightOf(doc, fixture);
  // The plan may have moved on since the answer was asked for.
  if (!fixture || !light) return [];
  const label = capitalised(labelOf(fixture, doc));
  const fault = (code: PlanFaultCode, severity: FaultSeverity, message: string): PlanFault[] => [
    { code, severity, recordId: fixture.id, otherId: null, message },
  ];
  const { window, target } = light;
  const volts = (limit: number) => voltsInWords(answer.volts, limit);
  switch (answer.state) {
    case 'off':
    // `unwired` comes with the warning `unreached`, told once.
    case 'unwired':
      return [];
    case 'dark':
      return fault(
        'dark',
        'fault',
        `${label} gets ${volts(window.minVolts)} and stays dark; it needs ${window.minVolts} V.`,
      );
    case 'dim':
      return fault('dim', 'fault', `${label} gets ${volts(window.minVolts)}; it needs ${window.minVolts} V.`);
    case 'overdriven':
      return fault(
        'overdriven',
        'fault',
        `${label} gets ${volts(window.maxVolts)}; more than ${window.maxVolts} V shortens its life.`,
      );
    case 'in-window':
      if (target && answer.aim === 'below')
        return fault(
          'below-aim',
          'advice',
          `${label} gets ${volts(target.minVolts)}, below the ${target.minVolts} V aimed at.`,
        );
      if (target && answer.aim === 'above')
        return fault(
          'above-aim',
          'advice',
          `${label} gets ${volts(target.maxVolts)}, above the ${target.maxVolts} V aimed at.`,
        );
      return [];
  }
}

function warningFaults(doc: PlanDocument, warning: EstimateWarning, answer: EstimateAnswer): PlanFault[] {
  const { subject, code } = warning;
  const record = doc.get(subject.transformerId ?? subject.id);
  if (!record) return [];
  const about = { code, recordId: record.id, otherId: null };
  const part = subject.transformerId === undefined ? {} : { part: subject.id };
  const fault = (severity: FaultSeverity, message: string): PlanFault[] => [
    { ...about, severity, ...part, message },
  ];
  const transformer = recordOf(doc, subject.transformerId ?? subject.id, 'transformer');
  const of = transformer ? ` of ${labelOf(transformer, doc)}` : '';
  switch (code) {
    case 'common-over-limit': {
      const common = answer.commons.find(
        (c) => c.id === subject.id && c.transformerId === subject.transformerId,
      );
      const load = common ? ` (${amps(common.amps)}, ${percent(common.loadPercent)} of its limit)` : '';
      return fault('fault', `Common ${subject.id}${of} carries too much${load}; move a run off it.`);
    }
    case 'tap-over-limit': {
      const tap = answer.taps.find((t) => t.id === subject.id && t.transformerId === subject.transformerId);
      const load = tap ? ` (${amps(tap.amps)})` : '';
      return fault('fault', `Tap ${subject.id}${of} carries more than its limit${load}; move a run off it.`);
    }
    case 'winding-over-rating': {
      const runs = runsOn(doc, transformer, subject.id).map((record) => labelOf(record, doc));
      const by = runs.length > 0 ? ` by ${listed(runs)}` : '';
      return fault('fault', `Winding ${subject.id}${of} is loaded beyond its rating${by}.`);
    }
    case 'transformer-over-rating':
      return fault(
        'fault',
        `${capitalised(labelOf(record, doc))} ${loadOf(answer, record.id)}, beyond its rating.`,
      );
    case 'transformer-over-target':
      return fault(
        'caution',
        `${capitalised(labelOf(record, doc))} ${loadOf(answer, record.id)}; keep to 80 % and leave room for additions.`,
      );
    case 'cable-over-ampacity': {
      const cable = answer.cables.find((c) => c.id === subject.id);
      const load = cable ? ` ${amps(Math.abs(cable.amps))}, ${percent(cable.ampacityPercent)} of` : '';
      return fault('fault', `A cable carries${load || ' more than'} what it may; use a heavier one.`);
    }
    case 'weak-short':
      return fault(
        'caution',
        `A dead short at the far end of ${labelOf(record, doc)} may draw too little to trip the breaker; use heavier cable or a shorter run.`,
      );
    case 'unreached':
      return fault('fault', `No cable brings current to ${labelOf(record, doc)}.`);
  }
}

function runsOn(
  doc: PlanDocument,
  transformer: TransformerRecord | undefined,
  windingId: string,
): RunRecord[] {
  const item = recordOf(doc, transformer?.itemId ?? null, 'item')?.item;
  if (!transformer || item?.category !== 'transformer') return [];
  const commons = new Set(item.terminals.filter((t) => t.winding === windingId).map((t) => t.id));
  return [...recordsOf(doc, 'run')].filter(
    (run) => run.transformerId === transformer.id && commons.has(run.commonId),
  );
}

function loadOf(answer: EstimateAnswer, transformerId: string): string {
  const load = answer.transformers.find((t) => t.id === transformerId);
  return load ? `is loaded to ${percent(load.loadPercent)} (${load.voltAmps.toFixed(0)} VA)` : 'is loaded';
}

function amps(value: number): string {
  return `${value.toFixed(1)} A`;
}

function percent(value: number | null): string {
  return value === null ? 'all' : `${value.toFixed(0)} %`;
}
