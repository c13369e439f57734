import type { Conductor } from '@lampwright/geometry/catalogue';
import { parseLength, type UnitSystem } from '@lampwright/geometry/units';
import type { FieldName, FlatItem } from './fields.js';

export interface CellFault {
  readonly field: FieldName;
  readonly detail: string;
}

/** Reads the cells of one row, and gathers what can't be read instead of stopping at the first. */
export class Cells {
  readonly faults: CellFault[] = [];

  constructor(
    private readonly flat: FlatItem,
    private readonly system: UnitSystem,
  ) {}

  fault(field: FieldName, detail: string): undefined {
    this.faults.push({ field, detail });
    return undefined;
  }

  /** Null where the cell is empty. */
  text(field: FieldName): string | null {
    const text = this.flat[field]?.trim() ?? '';
    return text === '' ? null : text;
  }

  needed(field: FieldName, what: string): string | undefined {
    return this.text(field) ?? this.fault(field, `${what} is missing.`);
  }

  /** A number, with or without its unit behind it. */
  number(field: FieldName): number | null | undefined {
    const text = this.text(field);
    if (text === null) return null;
    const bare = text.replace(/\s*(w|v|a|va|lm|cd|k|h|hrs?|hours|°|deg|degrees|%|awg)$/i, '').trim();
    const plain = /^\d{1,3}(,\d{3})+(\.\d+)?$/.test(bare) ? bare.replaceAll(',', '') : bare;
    if (!/^\d+(\.\d+)?$/.test(plain)) return this.fault(field, `“${shown(text)}” is no number.`);
    return Number(plain);
  }

  neededNumber(field: FieldName, what: string): number | undefined {
    const number = this.number(field);
    if (number === null) return this.fault(field, `${what} is missing.`);
    return number;
  }

  boolean(field: FieldName, otherwise: boolean): boolean | undefined {
    const text = this.text(field)?.toLowerCase();
    if (text === undefined) return otherwise;
    if (['yes', 'y', 'true', '1', 'x'].includes(text)) return true;
    if (['no', 'n', 'false', '0', '-'].includes(text)) return false;
    return this.fault(field, `“${shown(text)}” is neither yes nor no.`);
  }

  oneOf<T extends string>(field: FieldName, choices: readonly T[], otherwise: T | null): T | undefined {
    const text = this.text(field);
    if (text === null)
      return otherwise ?? this.fault(field, `This is missing; it is one of ${choices.join(', ')}.`);
    const wanted = text.toLowerCase().replace(/[\s_]+/g, '-');
    const found = choices.find((choice) => choice === wanted || `${choice}s` === wanted);
    return found ?? this.fault(field, `“${shown(text)}” is none of ${choices.join(', ')}.`);
  }

  /** A length with its unit; a bare number counts in the company's. */
  meters(field: FieldName): number | null | undefined {
    const text = this.text(field);
    if (text === null) return null;
    const parsed = parseLength(text, { preferred: this.system });
    return parsed.ok ? parsed.meters : this.fault(field, parsed.message);
  }

  /** "12 AWG", "2.5 mm²", "5.3 Ω/km"; a bare number is a gauge where gauges are that large. */
  conductor(field: FieldName): Conductor | null | undefined {
    const text = this.text(field);
    if (text === null) return null;
    const plain = text.toLowerCase().replaceAll(' ', '');
    const awg = /^(?:#)?(8|10|12|14|16|18)(?:awg|ga|gauge)?$/.exec(plain);
    if (awg) return { awg: Number(awg[1]) } as Conductor;
    const mm2 = /^(?:2[x×])?(1\.5|2\.5|4|6|10|16)mm(?:2|²)$/.exec(plain);
    if (mm2) return { mm2: Number(mm2[1]) } as Conductor;
    const ohms = /^(\d+(?:\.\d+)?)(?:ω|ohm|ohms)\/km$/.exec(plain);
    if (ohms && Number(ohms[1]) > 0) return { ohmsPerKm: Number(ohms[1]) };
    return this.fault(field, `“${shown(text)}” is no conductor; write 12 AWG, 2.5 mm² or 5.3 Ω/km.`);
  }
}

export function conductorText(conductor: Conductor): string {
  if ('awg' in conductor) return `${conductor.awg} AWG`;
  return 'mm2' in conductor ? `${conductor.mm2} mm²` : `${conductor.ohmsPerKm} Ω/km`;
}

const LONGEST_SHOWN = 60;
const shown = (text: string): string =>
  text.length > LONGEST_SHOWN ? `${text.slice(0, LONGEST_SHOWN)}…` : text;
