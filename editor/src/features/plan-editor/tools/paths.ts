import { placeMeasurement } from '@lampwright/geometry/plan';
import type { Point } from '../../../plan-view/camera';
import { createPathTool } from './path';
import { settle, type Tool, type ToolContext } from './tool';

/** Ground areas: corners by click, or one stroke by hand. What it is used for is asked at the end. */
export function createAreaTool(ctx: ToolContext): Tool {
  return createPathTool(ctx, {
    id: 'area',
    kind: 'polygon',
    freehand: true,
    least: 3,
    tooFew: 'An area needs at least three corners.',
    finish: (points) => ctx.request({ kind: 'area', points }),
  });
}

export function createMeasureTool(ctx: ToolContext): Tool {
  return createPathTool(ctx, {
    id: 'measure',
    kind: 'polyline',
    freehand: false,
    least: 2,
    tooFew: 'Measuring needs a start and an end: click both.',
    finish(points) {
      settle(ctx, 'Measure', () => placeMeasurement(ctx.doc(), { sheetId: ctx.sheetId(), points }));
    },
  });
}

/** References for the scale: two points of a known length, or four corners of a known rectangle, in order. */
export function createScaleTool(ctx: ToolContext): Tool {
  const shape = (): 'length' | 'rectangle' => ctx.choices().reference;
  const wanted = (): number => (shape() === 'length' ? 2 : 4);
  return createPathTool(ctx, {
    id: 'scale',
    kind: 'polyline',
    freehand: false,
    least: 2,
    tooFew: 'Click both ends of something whose length you know.',
    most: wanted,
    finish(points) {
      const [a, b, c, d] = points as [Point, Point, Point?, Point?];
      if (shape() === 'length') ctx.request({ kind: 'scale-length', a, b });
      else if (c !== undefined && d !== undefined)
        ctx.request({ kind: 'scale-rectangle', corners: [a, b, c, d] });
      else ctx.say('Click the four corners of the rectangle, in order around it.');
    },
    preview: (points, pending) => ({ kind: 'scale', shape: shape(), points: [...points], pending }),
  });
}
