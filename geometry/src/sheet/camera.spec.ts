import { describe, expect, it } from 'vitest';
import { heightAbove, photoCamera, planCamera, uprightPoint } from './camera.js';
import { applyHomography, inverse, type Matrix3, multiply } from './homography.js';
import {
  exactly,
  noisy,
  seeded,
  solvedPhoto,
  threeRectangles,
  yardPixel,
  yardRectangle,
  yardRectangleNames,
} from './yard.testkit.js';

const size = { widthPx: 2400, heightPx: 1600 };

/** A camera made by hand: where it stands, how far it looks down, which way round and how long its lens is. */
function made(
  focal: number,
  downDegrees: number,
  turnDegrees: number,
  eye: readonly [number, number, number],
) {
  const [d, a] = [downDegrees, turnDegrees].map((x) => (x * Math.PI) / 180) as [number, number];
  // Right, down and forward of the picture, in the ground's frame.
  const right = [Math.cos(a), Math.sin(a), 0];
  const ahead = [-Math.sin(a) * Math.cos(d), Math.cos(a) * Math.cos(d), -Math.sin(d)];
  const down = [Math.sin(a) * Math.sin(d), -Math.cos(a) * Math.sin(d), -Math.cos(d)];
  const at = (row: readonly number[], p: readonly number[]) =>
    row.reduce((sum, r, i) => sum + r * (p[i]! - eye[i]!), 0);
  const see = (p: readonly [number, number, number]) => {
    const depth = at(ahead, p);
    return { x: 1200 + (focal * at(right, p)) / depth, y: 800 + (focal * at(down, p)) / depth };
  };
  const k: Matrix3 = [focal, 0, 1200, 0, focal, 800, 0, 0, 1];
  const origin = [right, down, ahead].map((row) => at(row, [0, 0, 0])) as [number, number, number];
  const rt: Matrix3 = [
    right[0]!,
    right[1]!,
    origin[0],
    down[0]!,
    down[1]!,
    origin[1],
    ahead[0]!,
    ahead[1]!,
    origin[2],
  ];
  return { see, groundMatrix: inverse(multiply(k, rt)) };
}

describe('the camera of a photo', () => {
  it.each([
    [1900, 14, 0, [0, -9, 4.6]],
    [1300, 35, 28, [3, -5, 1.7]],
    [5200, 8, -70, [-40, 2, 6]],
  ] as const)('is found again from its ground (focal %d, %d° down, turned %d°)', (focal, down, turn, eye) => {
    const { see, groundMatrix } = made(focal, down, turn, eye);
    const camera = photoCamera(groundMatrix, size)!;
    expect([camera.eye!.x, camera.eye!.y, camera.eye!.z].map((n, i) => n - eye[i]!)).toEqual(
      [0, 0, 0].map((zero) => expect.closeTo(zero, 6)),
    );
    const a = (turn * Math.PI) / 180;
    for (const [aside, ahead, z] of [
      [2, 12, 0],
      [-3, 9, 2.5],
      [1, 30, 7],
    ] as const) {
      const x = eye[0] + aside * Math.cos(a) - ahead * Math.sin(a);
      const y = eye[1] + aside * Math.sin(a) + ahead * Math.cos(a);
      const seen = see([x, y, z]);
      const again = camera.project({ x, y, z })!;
      expect(again.x).toBeCloseTo(seen.x, 6);
      expect(again.y).toBeCloseTo(seen.y, 6);
      if (z > 0) {
        expect(heightAbove(camera, { x, y }, seen)).toBeCloseTo(z, 6);
        const point = uprightPoint(camera, { x, y }, seen)!;
        expect([point.x, point.y, point.z]).toEqual([x, y, z].map((n) => expect.closeTo(n, 6)));
      }
    }
  });

  it('does not depend on how the ground’s axes lie', () => {
    const { groundMatrix } = made(1700, 18, 5, [0, -9, 3]);
    // A ground that doesn't quite fit any camera: then the axes could matter.
    const bent = groundMatrix.map((n, i) => n * (1 + 0.01 * Math.sin(i + 1))) as unknown as Matrix3;
    const turned = (degrees: number): Matrix3 => {
      const a = (degrees * Math.PI) / 180;
      return multiply([Math.cos(a), -Math.sin(a), 0, Math.sin(a), Math.cos(a), 0, 0, 0, 1], bent);
    };
    const heights = [0, 30, 45, 90, 171].map((d) => photoCamera(turned(d), size)!.eye!.z);
    for (const z of heights) expect(z).toBeCloseTo(heights[0]!, 6);
  });

  it('is not told by a picture taken straight down, nor by a drawing', () => {
    expect(photoCamera(made(1900, 90, 0, [0, 0, 8]).groundMatrix, size)).toBeNull();
    expect(photoCamera([0.01, 0, 0, 0, -0.01, 16, 0, 0, 1], size)).toBeNull();
  });

  it('sees nothing behind it and no height below the ground', () => {
    const { groundMatrix } = made(1900, 14, 0, [0, -9, 4.6]);
    const camera = photoCamera(groundMatrix, size)!;
    expect(camera.project({ x: 0, y: -20, z: 1 })).toBeNull();
    expect(heightAbove(camera, { x: 0, y: 3 }, { x: 1200, y: 1590 })).toBeNull();
    expect(uprightPoint(camera, { x: 0, y: 3 }, { x: 1200, y: 1590 })).toBeNull();
  });
});

describe('the camera of the rendered yard', () => {
  const cameraOf = (references: Parameters<typeof solvedPhoto>[0]) => {
    const scale = solvedPhoto(references);
    return { scale, camera: photoCamera(scale.groundMatrix, size)! };
  };

  it.each(yardRectangleNames)('stands at the same height by the %s alone', (name) => {
    // It was rendered from a height of 4.6 m, as all three rectangles agree to a millimetre.
    expect(cameraOf([yardRectangle(name)]).camera.eye!.z).toBeCloseTo(4.6, 2);
  });

  it('has the pond’s rim as high as it was modelled, 120 mm, and the wall up to under the eaves', () => {
    const { scale, camera } = cameraOf(threeRectangles());
    // The upper ends were read off the picture, to about a pixel (6 mm of height at the rim, 12 mm at the wall).
    const rim = scale.groundFromSheet(yardPixel('pond outer near right'))!;
    expect(Math.abs(heightAbove(camera, rim, { x: 2251.9, y: 1033.8 })! - 0.12)).toBeLessThan(0.012);
    const corner = scale.groundFromSheet(yardPixel('house right corner'))!;
    const wall = heightAbove(camera, corner, { x: 1985.7, y: 463.3 })!;
    expect(Math.abs(wall - 2.966)).toBeLessThan(0.01);
    // The corner is plumb: its upper end is seen where the camera puts it.
    const top = camera.project({ ...corner, z: wall })!;
    expect(Math.hypot(top.x - 1985.7, top.y - 463.3)).toBeLessThan(1.5);
  });

  it('tells heights within 4 % when people click to a pixel (seed 77)', () => {
    const random = seeded(77);
    const height = (click: typeof exactly) => {
      const { scale, camera } = cameraOf(threeRectangles(click));
      const foot = scale.groundFromSheet(click(yardPixel('house right corner')))!;
      return heightAbove(camera, foot, click({ ...yardPixel('house right corner'), y: 463.3 } as never))!;
    };
    const exact = height(exactly);
    for (let i = 0; i < 20; i++) expect(Math.abs(height(noisy(random)) / exact - 1)).toBeLessThan(0.04);
  });
});

describe('the camera of a drawing from above', () => {
  it('sees everything where it stands, and no heights', () => {
    const matrix: Matrix3 = [0.02, 0.001, -3, 0.001, -0.02, 16, 0, 0, 1];
    const camera = planCamera(matrix);
    const ground = applyHomography(matrix, { x: 640, y: 480 })!;
    const seen = camera.project({ ...ground, z: 5 })!;
    expect(seen.x).toBeCloseTo(640, 9);
    expect(seen.y).toBeCloseTo(480, 9);
    expect(heightAbove(camera, ground, seen)).toBeNull();
    expect(uprightPoint(camera, ground, seen)).toBeNull();
  });
});
