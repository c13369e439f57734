import type { PaymentStage } from '@lampwright/geometry/price';
import { paymentStagesSchema, usualPriceBook } from '@lampwright/geometry/price';
import { describe, expect, it } from 'vitest';
import { ApiProblem } from '../../lib/api/client';
import { failedSave } from './api';
import { setsOf } from './groups-part';
import { amountOf } from './money-field';
import { exampleOf } from './profit-example';
import { readPercent, readWhole } from './read-number';
import { saveText } from './save-note';
import { scheduleText } from './schedule-part';
import { withRest } from './stages-editor';
import { quantityText } from './words';

describe('what somebody types', () => {
  it('is money in the manner of the locale, in whole minor units', () => {
    const dollars = { currency: 'USD', locale: 'en-US' };
    expect(amountOf('1,240.00', dollars)).toBe(124_000);
    expect(amountOf('$12.5', dollars)).toBe(1_250);
    expect(amountOf('1.240,50', { currency: 'EUR', locale: 'de-DE' })).toBe(124_050);
    expect(amountOf(' ', dollars)).toBeNull();
    expect(amountOf('12.345', dollars)).toBeNaN();
    expect(amountOf('a lot', dollars)).toBeNaN();
  });

  it('is a share with at most four decimals, or a whole number', () => {
    expect(readPercent('6.625 %', 100)).toBe(6.625);
    expect(readPercent('6,625', 100)).toBe(6.625);
    expect(readPercent('0.00001', 100)).toBeNull();
    expect(readPercent('101', 100)).toBeNull();
    expect(readPercent('', 100)).toBeNull();
    expect(readWhole('2', 20)).toBe(2);
    expect(readWhole('2.5', 20)).toBeNull();
    expect(readWhole('-1', 20)).toBeNull();
  });
});

it('writes quantities with their unit', () => {
  expect(quantityText(1250.5, 'foot', 'en-US')).toBe('1,250.5 ft');
  expect(quantityText(5, 'each', 'en-US')).toBe('5');
  expect(quantityText(1, 'visit', 'en-US')).toBe('1 visit');
});

it('gives the last payment stage what the others leave, without crumbs of arithmetic', () => {
  const stage = (id: string, percent: number): PaymentStage => ({ id, name: id, due: 'finish', percent });
  const stages = withRest([stage('a', 33.3333), stage('b', 33.3333), stage('c', 5)]);
  expect(stages.map(({ percent }) => percent)).toEqual([33.3333, 33.3333, 33.3334]);
  expect(paymentStagesSchema.safeParse(stages).success).toBe(true);
});

it('shows what becomes of a cost, by markup and by margin', () => {
  const book = { ...usualPriceBook('us'), overheadPercent: 15 };
  const of = (by: 'markup' | 'margin', percent: number) =>
    exampleOf({ ...book, materials: { by, percent } }, 'materials');
  expect(of('markup', 25)).toBe(14_375);
  expect(of('margin', 50)).toBe(23_000);
  expect(of('margin', 96)).toBeNull();
  expect(of('markup', Number.NaN)).toBeNull();
});

it('gathers lights by run and kind', () => {
  const light = (id: string, kind: 'path' | 'up', run: number | null) => ({
    id,
    tag: id,
    name: '',
    kind,
    quantity: 1,
    run: run === null ? null : { id: `r${run}`, label: `Run ${run}` },
  });
  const { runs, kinds } = setsOf([light('p1', 'path', 2), light('u1', 'up', 10), light('u2', 'up', null)]);
  expect(runs.map(({ label, ids }) => [label, ids])).toEqual([
    ['Run 2', ['p1']],
    ['Run 10', ['u1']],
  ]);
  expect(kinds.map(({ label, ids }) => [label, ids])).toEqual([
    ['Path', ['p1']],
    ['Up', ['u1', 'u2']],
  ]);
});

it('copies the schedule as columns, whatever a name holds', () => {
  const text = scheduleText([
    {
      recordId: 'r',
      tag: 'P1',
      kind: 'path',
      fixture: 'Path\tlight\nbrass',
      lamp: '',
      quantity: 2,
      watts: 3,
      lumens: null,
      beamDegrees: 130,
      cctKelvin: 2700,
    },
  ]);
  const [head = '', row = ''] = text.split('\n');
  expect(head.split('\t')).toHaveLength(row.split('\t').length);
  expect(row).toBe('P1\tPath\tPath light brass\tbuilt in\t2\t3\t\t130\t2700');
});

describe('a save that failed', () => {
  it('waits where it may pass by itself, and is refused where it will not', () => {
    const of = (status: number, code = 'x') => failedSave(new ApiProblem(status, code, 'Said so.')).is;
    expect([0, 401, 429, 503].map((status) => of(status))).toEqual(Array(4).fill('waiting'));
    expect([400, 403, 404].map((status) => of(status))).toEqual(Array(3).fill('refused'));
    expect(of(409, 'pricing-conflict')).toBe('conflict');
    expect(of(409, 'archived')).toBe('refused');
  });

  it('is told with how much is unsaved', () => {
    expect(saveText({ save: { is: 'saved' }, unsent: 0 })).toBe('Saved');
    expect(saveText({ save: { is: 'waiting', message: '' }, unsent: 3 })).toBe('Not saved yet, 3 changes');
  });
});
