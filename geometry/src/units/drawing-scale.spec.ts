import { describe, expect, it } from 'vitest';
import { formatRatio, parseDrawingScale } from './drawing-scale.js';

describe('parseDrawingScale', () => {
  it.each([
    ['1 in = 10 ft', 120],
    [`1" = 10'`, 120],
    [`1″=10′`, 120],
    [`1/4" = 1'`, 48],
    [`1/8" = 1'-0"`, 96],
    ['1:100', 100],
    ['1 : 250', 250],
    ['2 cm = 1 m', 50],
    [`1" : 20'`, 240],
  ])('reads %s as 1:%d', (text, ratio) => {
    const parsed = parseDrawingScale(text);
    expect(parsed).toMatchObject({ ok: true });
    if (parsed.ok) expect(parsed.groundMetersPerPaperMeter).toBeCloseTo(ratio, 9);
  });

  it.each([
    ['', 'empty'],
    ['100', 'unreadable'],
    ['1 in = 10', 'unreadable'],
    ['1 = 10 ft', 'unreadable'],
    ['0:100', 'unreadable'],
    ['1:2:3', 'unreadable'],
    ['to fit', 'unreadable'],
    ['10 ft = 1 in', 'out-of-range'],
    [`1:0`, 'out-of-range'],
  ] as const)('refuses "%s" as %s, saying what is accepted', (text, code) => {
    const parsed = parseDrawingScale(text);
    expect(parsed).toMatchObject({ ok: false, code });
    if (!parsed.ok) expect(parsed.message).toContain('1 in = 10 ft');
  });
});

describe('formatRatio', () => {
  it('shows a ratio', () => {
    expect(formatRatio(120)).toBe('1:120');
    expect(formatRatio(1 / 0.0254)).toBe('1:39.37');
  });
});
