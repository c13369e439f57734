import { CholeskyDecomposition, Matrix } from 'ml-matrix';
import type { SheetPoint } from '../units/brand.js';
import { bundleProblem, HOMOGRAPHY_PARAMETERS, parameterOffsets } from './bundle.js';
import { fault } from './checks.js';
import { applyHomography, homographyFromPoints, inverse, type Matrix3, normalisation } from './homography.js';
import { minimise } from './least-squares.js';
import { type GroundFrame, PhotoScale } from './photo-scale.js';
import type { CalibrationFault, RectangleReference, ScaleReference } from './references.js';
import { imageArea, type Pose, poseThrough, type RigidShape, rigidShape } from './rigid-shape.js';

/**
 * The homography of a photo by joint least squares over all references: each rectangle and each length is a
 * rigid shape somewhere on the ground, and what is minimised is the distance in the image between its
 * points and the clicks. To first order this weighs a length by its own propagated error.
 *
 * Starts from the rectangle that fills most of the image, solved exactly; falls back on the others. All
 * references must have been checked, and at least one is a rectangle.
 */
export function solvePerspective(
  references: readonly ScaleReference[],
  clickSigmaPixels: number,
): { ok: true; scale: PhotoScale } | CalibrationFault {
  const rectangles = references.filter((r): r is RectangleReference => r.kind === 'rectangle');
  const bases = rectangles.toSorted(
    (a, b) => Math.abs(imageArea(b.corners)) - Math.abs(imageArea(a.corners)),
  );
  let firstFault: CalibrationFault | null = null;
  for (const base of bases) {
    const solved = solveFrom(base, references, clickSigmaPixels);
    if (solved.ok) return solved;
    firstFault ??= solved;
  }
  return (
    firstFault ?? fault('needs-rectangle', 'A photo needs one rectangle on the ground with known sides.')
  );
}

function solveFrom(
  base: RectangleReference,
  references: readonly ScaleReference[],
  clickSigmaPixels: number,
): { ok: true; scale: PhotoScale } | CalibrationFault {
  const image = normalisation(references.flatMap(clicksOf));
  if (!image) return fault('corners-collinear', 'All the points are at one place.', base.id);
  const normalise = (p: { x: number; y: number }) => ({
    x: (p.x - image.x) * image.scale,
    y: (p.y - image.y) * image.scale,
  });
  const unit = Math.hypot(base.widthMeters, base.depthMeters) / 2;
  const shapes = [base, ...references.filter((r) => r !== base)].map((r) => rigidShape(r, unit, normalise));
  const start = startFrom(shapes);
  if (!(start instanceof Float64Array)) return start;

  const clickSigma = clickSigmaPixels * image.scale;
  const fit = minimise(bundleProblem(shapes, clickSigma), start);
  const contradiction = fault(
    'references-contradict',
    'The references don’t agree on any one ground; check the sides typed and the corners’ order.',
  );
  if (!fit) return contradiction;
  const cholesky = new CholeskyDecomposition(fit.normal);
  if (!cholesky.isPositiveDefinite()) return contradiction;
  const { offsets, count } = parameterOffsets(shapes);
  const stretches = shapes.filter((s) => s.stretch).length;
  const observations = shapes.reduce((sum, s) => sum + 2 * s.seen.length, 0) + stretches;
  const freedom = observations - count;
  const first = shapes.findIndex((s) => s.reference === references.find((r) => r.kind === 'rectangle'));
  const scale = new PhotoScale({
    homography: [...fit.x.subarray(0, HOMOGRAPHY_PARAMETERS), 1] as unknown as Matrix3,
    unitCovariance: cholesky
      .solve(Matrix.eye(count, HOMOGRAPHY_PARAMETERS))
      .subMatrix(0, HOMOGRAPHY_PARAMETERS - 1, 0, HOMOGRAPHY_PARAMETERS - 1)
      .mul(clickSigma ** 2)
      .to1DArray(),
    image,
    frame: frameOf(shapes[first]!, poseAt(fit.x, offsets[first]!), unit),
    references,
    misfit: freedom > 0 ? Math.sqrt(fit.cost / freedom) / clickSigma : null,
    clickSigmaPixels,
  });
  return { ok: true, scale };
}

function clicksOf(reference: ScaleReference): readonly SheetPoint[] {
  return reference.kind === 'rectangle' ? reference.corners : [reference.a, reference.b];
}

/** First values of all parameters from the base rectangle alone, or the reference that it can't place. */
function startFrom(shapes: readonly RigidShape[]): Float64Array | CalibrationFault {
  const base = shapes[0]!;
  const exact = homographyFromPoints(base.own.map((from, i) => ({ from, to: base.seen[i]! })));
  if (!exact || !(exact[8] > 0)) {
    return fault('corners-collinear', 'These four corners don’t fix a ground.', base.reference.id);
  }
  const homography = exact.map((n) => n / exact[8]) as unknown as Matrix3;
  const back = inverse(homography);
  const { offsets, count } = parameterOffsets(shapes);
  const start = new Float64Array(count);
  start.set(homography.slice(0, HOMOGRAPHY_PARAMETERS));
  for (const [i, shape] of shapes.entries()) {
    if (i === 0) continue;
    const ground = shape.seen.map((p) => applyHomography(back, p));
    if (!ground.every((p) => p !== null)) {
      return fault(
        'over-horizon',
        'A point of this reference lies above the horizon that the rectangle gives; check its corners’ order and its sides.',
        shape.reference.id,
      );
    }
    const pose = poseThrough(shape.own, ground);
    start.set([pose.angle, pose.x, pose.y], offsets[i]!);
    if (shape.stretch) start[offsets[i]! + 3] = shape.stretch.stated;
  }
  return start;
}

function poseAt(x: Float64Array, offset: number): Pose {
  return offset < 0 ? { angle: 0, x: 0, y: 0 } : { angle: x[offset]!, x: x[offset + 1]!, y: x[offset + 2]! };
}

/**
 * The ground's frame: the middle of the first rectangle, turned by a multiple of 90° so that x runs along
 * the side that points most to the right in the image (and so y away from the viewer).
 */
function frameOf(shape: RigidShape, pose: Pose, unit: number): GroundFrame {
  const [c0, c1, , c3] = shape.seen;
  const up = Math.sign(shape.own[3]!.y);
  const alongX = { x: c1!.x - c0!.x, y: c1!.y - c0!.y };
  const alongY = { x: (c3!.x - c0!.x) * up, y: (c3!.y - c0!.y) * up };
  const rightX = alongX.x / Math.hypot(alongX.x, alongX.y);
  const rightY = alongY.x / Math.hypot(alongY.x, alongY.y);
  const candidates = [rightX, rightY, -rightX, -rightY];
  const quarterTurns = candidates.indexOf(Math.max(...candidates));
  const angle = pose.angle + (quarterTurns * Math.PI) / 2;
  return { originX: pose.x, originY: pose.y, angle, unit };
}
