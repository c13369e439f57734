import { describe, expect, it } from 'vitest';
import { buildScene } from '../../../plan-view/scene';
import { yardWith } from '../tools/driver.testkit';
import { Painter } from './painter';

function painted() {
  const d = yardWith(3);
  d.use('cable').click(100, 100).click(300, 100).click(500, 100).key('Enter');
  const scene = buildScene(
    d.doc,
    'sheet',
    { answers: null, unwired: new Set() },
    { lengthText: () => '', areaText: () => '', heightText: () => '', cableLength: () => '' },
  );
  const painter = new Painter(1);
  const ids = new Set([d.all('fixture')[0]!.id]);
  painter.update({ scene, size: { width: 800, height: 600 }, selection: ids });
  return { painter, ids, scene };
}

const names = (dirty: ReadonlySet<string>) => [...dirty].sort();

describe('what is painted again', () => {
  it('is everything when the view moves', () => {
    const { painter } = painted();
    expect(names(painter.update({ camera: { x: 1, y: 0, zoom: 1 } }))).toEqual([
      'cable',
      'fixtures',
      'ground',
      'overlay',
    ]);
  });

  it('is only the overlay while a drag goes on', () => {
    const { painter, ids } = painted();
    painter.update({ preview: { kind: 'move', ids, dx: 1, dy: 0 } });
    expect(names(painter.update({ preview: { kind: 'move', ids, dx: 2, dy: 0 } }))).toEqual(['overlay']);
    expect(names(painter.update({ preview: { kind: 'move', ids, dx: 3, dy: 1 } }))).toEqual(['overlay']);
  });

  it('is all layers once when the drag begins and once when it ends', () => {
    const { painter, ids } = painted();
    const all = ['cable', 'fixtures', 'ground', 'overlay'];
    expect(names(painter.update({ preview: { kind: 'move', ids, dx: 1, dy: 0 } }))).toEqual(all);
    expect(names(painter.update({ preview: null }))).toEqual(all);
  });

  it('is nothing when nothing changed', () => {
    const { painter, scene } = painted();
    expect(names(painter.update({ scene }))).toEqual([]);
  });

  it('leaves ground and cable alone when the pointer only moves a tool’s preview', () => {
    const { painter } = painted();
    painter.update({ preview: { kind: 'place', at: { x: 1, y: 1 }, mark: { kind: 'hub' }, snapped: false } });
    expect(
      names(
        painter.update({
          preview: { kind: 'place', at: { x: 2, y: 1 }, mark: { kind: 'hub' }, snapped: false },
        }),
      ),
    ).toEqual(['overlay']);
  });
});
