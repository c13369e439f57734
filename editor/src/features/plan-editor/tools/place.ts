import {
  type EditResult,
  placeFeed,
  placeFixture,
  placeJunction,
  placeTransformer,
} from '@lampwright/geometry/plan';
import type { Point } from '../../../plan-view/camera';
import { cableAt, nodeAt } from './hit';
import { type PlaceMark, type Preview, settle, type Tool, type ToolContext, type ToolId } from './tool';

interface Placing {
  readonly id: ToolId;
  readonly label: string;
  /** What the pointer carries; null while nothing is chosen to be placed. */
  mark(): PlaceMark | null;
  /** Said when there is nothing to place. */
  readonly missing: string;
  /** Whether it can be put on cable, which then runs through it. */
  readonly ontoCable: boolean;
  put(at: Point, onCableId: string | undefined): EditResult;
}

/** The state machine of every tool that puts a thing down with a click; stays in the tool for the next one. */
function createPlacingTool(ctx: ToolContext, placing: Placing): Tool {
  let pointer: Point | null = null;
  let pressed = false;

  const move = (at: Point | null): void => {
    pointer = at;
    ctx.changed();
  };

  const landing = (at: Point): { at: Point; cableId: string | undefined } => {
    const cable = placing.ontoCable ? cableAt(ctx, at) : null;
    return cable === null ? { at, cableId: undefined } : { at: cable.at, cableId: cable.cable.id };
  };

  const click = (at: Point): void => {
    // A click on a mark that is there already means that mark: two on one spot would hide each other.
    const there = nodeAt(ctx, at);
    if (there !== null) {
      ctx.select([there.id]);
      return;
    }
    if (placing.mark() === null) {
      ctx.say(placing.missing);
      return;
    }
    const { at: spot, cableId } = landing(at);
    settle(ctx, placing.label, () => placing.put(spot, cableId));
  };

  return {
    id: placing.id,
    handle(event) {
      switch (event.type) {
        case 'down':
          pressed = true;
          move(event.at);
          return true;
        case 'move':
          if (!pressed) ctx.hover(nodeAt(ctx, event.at)?.id ?? null);
          move(event.at);
          return true;
        case 'up':
          if (pressed) click(event.at);
          pressed = false;
          return true;
        case 'cancel':
          pressed = false;
          move(null);
          return true;
        case 'leave':
          ctx.hover(null);
          move(null);
          return true;
        case 'key':
        case 'double':
        case 'typed':
          return false;
      }
    },
    preview(): Preview | null {
      const mark = placing.mark();
      if (pointer === null || mark === null || nodeAt(ctx, pointer) !== null) return null;
      const { at, cableId } = landing(pointer);
      return { kind: 'place', at, mark, snapped: cableId !== undefined };
    },
    exit() {
      pressed = false;
      ctx.hover(null);
      move(null);
    },
    touchDrag: () => 'pan',
  };
}

export function createFixtureTool(ctx: ToolContext): Tool {
  return createPlacingTool(ctx, {
    id: 'fixture',
    label: 'Place fixture',
    missing: 'Choose a fixture to place first.',
    ontoCable: true,
    mark() {
      const choice = ctx.choices().fixture;
      return choice === null ? null : { kind: 'fixture', initial: choice.initial };
    },
    put(at, onCableId) {
      const choice = ctx.choices().fixture!;
      return placeFixture(ctx.doc(), {
        sheetId: ctx.sheetId(),
        at,
        fixture: choice.item,
        lamp: choice.lamp,
        ...(onCableId === undefined ? {} : { onCableId }),
      });
    },
  });
}

export function createTransformerTool(ctx: ToolContext): Tool {
  return createPlacingTool(ctx, {
    id: 'transformer',
    label: 'Place transformer',
    missing: 'Choose a transformer to place first.',
    ontoCable: false,
    mark: () => (ctx.choices().transformer === null ? null : { kind: 'transformer' }),
    put(at) {
      const choice = ctx.choices().transformer!;
      const place = { sheetId: ctx.sheetId(), at };
      switch (choice.kind) {
        case 'new':
          return placeTransformer(ctx.doc(), { ...place, transformer: choice.item });
        case 'feed':
          return placeFeed(ctx.doc(), { ...place, transformerId: choice.transformerId });
      }
    },
  });
}

export function createHubTool(ctx: ToolContext): Tool {
  return createPlacingTool(ctx, {
    id: 'hub',
    label: 'Place hub',
    missing: 'Choose a hub or a splice first.',
    ontoCable: true,
    mark: () => ({ kind: ctx.choices().junction }),
    put: (at, onCableId) =>
      placeJunction(ctx.doc(), {
        sheetId: ctx.sheetId(),
        at,
        style: ctx.choices().junction,
        item: null,
        ...(onCableId === undefined ? {} : { onCableId }),
      }),
  });
}
