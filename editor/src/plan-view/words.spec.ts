import { describe, expect, it } from 'vitest';
import { percentText, voltAmpsText, voltsText } from './words';

const window = { minVolts: 10.8, maxVolts: 12 };

describe('figures', () => {
  it('show a tenth of a volt, and a hundredth only where the tenth would lie about the limit', () => {
    expect(voltsText(11.234, window)).toBe('11.2 V');
    expect(voltsText(10.76, window)).toBe('10.76 V');
    expect(voltsText(10.74, window)).toBe('10.7 V');
    expect(voltsText(12.04, window)).toBe('12.04 V');
    expect(voltsText(12, window)).toBe('12.0 V');
    expect(voltsText(10.76, null)).toBe('10.8 V');
  });

  it('never round a share down onto a limit that it passes', () => {
    expect(percentText(80.2)).toBe('80.2 %');
    expect(percentText(100.01)).toBe('100.1 %');
    expect(percentText(79.6)).toBe('80 %');
    expect(percentText(42.4)).toBe('42 %');
  });

  it('show small loads with a tenth', () => {
    expect(voltAmpsText(4.44)).toBe('4.4 VA');
    expect(voltAmpsText(180.6)).toBe('181 VA');
  });
});
