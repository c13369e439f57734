import { createAimTool } from './aim';
import { createCableTool } from './cable';
import { createFaceTool } from './face';
import { createNoteTool } from './note';
import { createAreaTool, createMeasureTool, createScaleTool } from './paths';
import { createFixtureTool, createHubTool, createTransformerTool } from './place';
import { createSelectTool } from './select';
import type { Tool, ToolContext, ToolId } from './tool';
import { createTreeTool } from './tree';

export function createTool(id: ToolId, ctx: ToolContext): Tool {
  switch (id) {
    case 'select':
      return createSelectTool(ctx);
    case 'transformer':
      return createTransformerTool(ctx);
    case 'fixture':
      return createFixtureTool(ctx);
    case 'cable':
      return createCableTool(ctx);
    case 'hub':
      return createHubTool(ctx);
    case 'aim':
      return createAimTool(ctx);
    case 'face':
      return createFaceTool(ctx);
    case 'tree':
      return createTreeTool(ctx);
    case 'area':
      return createAreaTool(ctx);
    case 'measure':
      return createMeasureTool(ctx);
    case 'note':
      return createNoteTool(ctx);
    case 'scale':
      return createScaleTool(ctx);
  }
}
