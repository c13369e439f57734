import { describe, expect, it } from 'vitest';
import { CameraStore } from '../canvas/camera-store';
import { litOf } from './lit';

describe('what an address asks to have chosen', () => {
  it('is named after the question mark or after the hash, each once', () => {
    expect(litOf('?lit=a,b', '')).toEqual(['a', 'b']);
    expect(litOf('?sheet=s&lit=a,b,a', '#lit=c,b')).toEqual(['a', 'b', 'c']);
    expect(litOf('?sheet=s', '')).toEqual([]);
  });

  it('fills the view once the drawing has a size, until somebody moves it', () => {
    const camera = new CameraStore();
    camera.aimAt({ left: 900, top: 900, right: 1000, bottom: 1000 });
    camera.show({ width: 4000, height: 3000 });
    camera.resize({ width: 800, height: 600 });
    const middle = () => {
      const { x, y, zoom } = camera.camera;
      return [(400 - x) / zoom, (300 - y) / zoom].map(Math.round);
    };
    expect(middle()).toEqual([950, 950]);
    expect(camera.camera.zoom).toBeGreaterThan(1);
    camera.resize({ width: 800, height: 600 });
    expect(middle()).toEqual([950, 950]);
    camera.fit();
    expect(middle()).toEqual([2000, 1500]);
  });
});
