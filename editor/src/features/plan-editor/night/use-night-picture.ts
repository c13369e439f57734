import { useEffect, useRef } from 'react';
import type { SheetImage, SheetImageState } from '../canvas/sheet-image';
import { useNight, useNightController } from './context';
import { NightPicture } from './picture';

/** The open sheet at night, or null while it is day or not worked out. `redraw` is called whenever it has changed. */
export function useNightPicture(
  sheet: SheetImageState,
  redraw: () => void,
): { readonly current: SheetImage | null } {
  const night = useNightController();
  const open = useNight((s) => s.open);
  const shown = useRef<SheetImage | null>(null);
  const photo = sheet.is === 'ready' ? sheet.image : null;
  useEffect(() => {
    if (!open || photo === null) return;
    let picture: NightPicture | null = null;
    let drawn: unknown = null;
    const changed = () => {
      shown.current = picture?.image ?? null;
      redraw();
    };
    const draw = () => {
      const { frame } = night.state.getState();
      if (frame === drawn) return;
      drawn = frame;
      if (frame === null) {
        shown.current = null;
        redraw();
        return;
      }
      picture ??= new NightPicture(photo, changed);
      picture.draw(frame);
    };
    draw();
    const stop = night.state.subscribe(draw);
    return () => {
      stop();
      picture?.dispose();
      picture = null;
      changed();
    };
  }, [night, open, photo, redraw]);
  return shown;
}
