import { createStore, type StoreApi } from 'zustand/vanilla';
import { createTool } from './create';
import type { Preview, Tool, ToolContext, ToolEvent, ToolId } from './tool';

export interface ToolHostState {
  readonly toolId: ToolId;
  readonly preview: Preview | null;
}

/** Holds the tool at work, hands it events, and keeps its preview for whoever draws it. */
export class ToolHost {
  readonly state: StoreApi<ToolHostState>;
  private tool: Tool;
  private readonly ctx: ToolContext;
  private settled = true;

  constructor(ctx: Omit<ToolContext, 'changed'>) {
    this.ctx = { ...ctx, changed: () => this.refresh() };
    this.tool = createTool('select', this.ctx);
    this.state = createStore<ToolHostState>(() => ({ toolId: 'select', preview: null }));
  }

  /** Leaves the tool at work, its unfinished gesture with it, and takes up another. */
  use(id: ToolId): void {
    if (id === this.tool.id) return;
    this.tool.exit();
    this.tool = createTool(id, this.ctx);
    this.state.setState({ toolId: id, preview: null });
  }

  handle(event: ToolEvent): boolean {
    // Most events change the preview several times; it is read once, at the end.
    this.settled = false;
    try {
      return this.tool.handle(event);
    } finally {
      this.settled = true;
      this.refresh();
    }
  }

  touchDrag(at: { x: number; y: number }): 'draw' | 'pan' {
    return this.tool.touchDrag(at);
  }

  /** Reads the preview again, e.g. when the plan changed under it. */
  refresh(): void {
    if (!this.settled) return;
    const preview = this.tool.preview();
    if (preview !== null || this.state.getState().preview !== null) this.state.setState({ preview });
  }
}
