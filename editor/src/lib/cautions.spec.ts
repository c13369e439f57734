import { describe, expect, it } from 'vitest';
import { stageCautions } from './cautions';
import { stages } from './stages';

describe('cautions of a job', () => {
  it('are told in every stage, in the words of the region', () => {
    for (const stage of stages) expect(stageCautions(stage, 'RCD').length).toBeGreaterThan(0);
    expect(stageCautions('commission', 'RCD').join(' ')).toContain('RCD-protected');
    expect(stageCautions('commission', 'RCD').join(' ')).not.toContain('GFCI');
  });

  it('put the locate service before any digging', () => {
    expect(stageCautions('prepare', 'GFCI')[0]).toMatch(/locate service before digging/);
    expect(stageCautions('install', 'GFCI')[0]).toMatch(/locate service before digging/);
  });
});
