// Without the solver’s linear algebra, so that whoever only maps points need not load that.

export interface PlanePoint {
  readonly x: number;
  readonly y: number;
}

/** A 3 × 3 matrix, row by row. */
export type Matrix3 = readonly [number, number, number, number, number, number, number, number, number];

/** The image of a point; null where it is at infinity or beyond it. */
export function applyHomography(m: Matrix3, p: PlanePoint): PlanePoint | null {
  const w = m[6] * p.x + m[7] * p.y + m[8];
  if (!(w > 0)) return null;
  return { x: (m[0] * p.x + m[1] * p.y + m[2]) / w, y: (m[3] * p.x + m[4] * p.y + m[5]) / w };
}

export function determinant(m: Matrix3): number {
  return (
    m[0] * (m[4] * m[8] - m[5] * m[7]) -
    m[1] * (m[3] * m[8] - m[5] * m[6]) +
    m[2] * (m[3] * m[7] - m[4] * m[6])
  );
}

/** The inverse of a matrix that is known to have one. */
export function inverse(m: Matrix3): Matrix3 {
  const d = 1 / determinant(m);
  return [
    (m[4] * m[8] - m[5] * m[7]) * d,
    (m[2] * m[7] - m[1] * m[8]) * d,
    (m[1] * m[5] - m[2] * m[4]) * d,
    (m[5] * m[6] - m[3] * m[8]) * d,
    (m[0] * m[8] - m[2] * m[6]) * d,
    (m[2] * m[3] - m[0] * m[5]) * d,
    (m[3] * m[7] - m[4] * m[6]) * d,
    (m[1] * m[6] - m[0] * m[7]) * d,
    (m[0] * m[4] - m[1] * m[3]) * d,
  ];
}

export function multiply(a: Matrix3, b: Matrix3): Matrix3 {
  const row = (i: 0 | 3 | 6): [number, number, number] => [
    a[i] * b[0] + a[i + 1]! * b[3] + a[i + 2]! * b[6],
    a[i] * b[1] + a[i + 1]! * b[4] + a[i + 2]! * b[7],
    a[i] * b[2] + a[i + 1]! * b[5] + a[i + 2]! * b[8],
  ];
  return [...row(0), ...row(3), ...row(6)];
}
