import { describe, expect, it } from 'vitest';
import { Driver, yardWith } from './driver.testkit';

describe('placing tools', () => {
  it('put one thing down with each click and choose it', () => {
    const d = new Driver().use('fixture');
    d.click(300, 200).click(500, 200);
    expect(d.all('fixture').map((f) => f.number)).toEqual([1, 2]);
    expect([...d.selection]).toEqual([d.all('fixture')[1]!.id]);
    expect(d.all('item')).toHaveLength(1);
    expect(d.labels).toEqual(['Place fixture', 'Place fixture']);
  });

  it('show what the pointer carries, and nothing once it has left', () => {
    const d = new Driver().use('fixture');
    d.move(300, 200);
    expect(d.preview).toEqual({
      kind: 'place',
      at: { x: 300, y: 200 },
      mark: { kind: 'fixture', initial: 'P' },
      snapped: false,
    });
    d.host.handle({ type: 'leave' });
    expect(d.preview).toBeNull();
  });

  it('put a fixture onto cable, which then runs through it', () => {
    const d = yardWith(1);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    d.use('fixture').move(200, 104);
    expect(d.preview).toMatchObject({ at: { x: 200, y: 100 }, snapped: true });
    d.click(200, 104);
    expect(d.all('cable')).toHaveLength(2);
    expect(new Set(d.all('cable').map((c) => c.runId)).size).toBe(1);
    expect(d.all('fixture')[1]!.at).toEqual({ x: 200, y: 100 });
  });

  it('choose a mark that is there already instead of hiding it under another', () => {
    const d = yardWith(1);
    d.use('fixture').click(302, 101);
    expect(d.all('fixture')).toHaveLength(1);
    expect([...d.selection]).toEqual([d.all('fixture')[0]!.id]);
  });

  it('place nothing when the pointer is cancelled before it is lifted', () => {
    const d = new Driver().use('fixture');
    d.down(300, 200).cancel().up(300, 200);
    expect(d.all('fixture')).toHaveLength(0);
  });

  it('ask for a choice when there is nothing to place', () => {
    const d = new Driver().use('transformer');
    d.choices = { ...d.choices, transformer: null };
    d.click(300, 200);
    expect(d.said).toEqual(['Choose a transformer to place first.']);
  });

  it('put down a hub or a splice, on the ground or on cable', () => {
    const d = yardWith(1);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    d.use('hub').click(200, 100).click(700, 700);
    d.choices = { ...d.choices, junction: 'splice' };
    d.click(800, 700);
    expect(d.all('junction').map((j) => j.style)).toEqual(['hub', 'hub', 'splice']);
    expect(d.all('cable')).toHaveLength(2);
  });
});

describe('note tool', () => {
  it('asks for the words where it was clicked', () => {
    const d = new Driver().use('note');
    d.click(120, 80);
    expect(d.requests).toEqual([{ kind: 'note', at: { x: 120, y: 80 } }]);
    d.down(1, 1).cancel().up(1, 1);
    expect(d.requests).toHaveLength(1);
  });
});
