import type { PlanPoint } from '@lampwright/geometry/plan';
import type { NightController } from './controller';

/** What tests in a real browser need of the night picture, whose pixels no selector can find. */
export interface NightTestHandle {
  /** Resolves when no light is being worked out. */
  settled(): Promise<void>;
  /** Lux of what the sheet shows at a point, red, green and blue added up; null while there is no picture. */
  lightAt(p: PlanPoint): number | null;
}

declare global {
  interface Window {
    __night?: NightTestHandle;
  }
}

/** Only test builds have the handle: elsewhere the flag is unset and this code is dropped from the bundle. */
export function exposeNightHandle(night: NightController): () => void {
  if (import.meta.env.VITE_TEST_HANDLE !== '1') return () => {};
  window.__night = {
    settled: () => night.settled(),
    lightAt(p) {
      const { frame, scene } = night.state.getState();
      if (frame === null || scene === null) return null;
      const { width, height, rgba } = frame.light;
      const x = Math.min(width - 1, Math.max(0, Math.floor((p.x * width) / scene.widthPx)));
      const y = Math.min(height - 1, Math.max(0, Math.floor((p.y * height) / scene.heightPx)));
      const at = (y * width + x) * 4;
      return rgba[at]! + rgba[at + 1]! + rgba[at + 2]!;
    },
  };
  return () => {
    delete window.__night;
  };
}
