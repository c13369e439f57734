import { useEffect, useState } from 'react';

export type SheetLevel = HTMLImageElement | HTMLCanvasElement;

export interface SheetImage {
  /** The picture and halves of it, largest first: drawing far out takes a small one, which is quicker and calmer. */
  readonly levels: readonly SheetLevel[];
  readonly width: number;
  readonly height: number;
}

export type SheetImageState =
  | { readonly is: 'loading' }
  | { readonly is: 'ready'; readonly image: SheetImage }
  | { readonly is: 'failed'; readonly retry: () => void };

/** Below this no smaller copy is worth its memory. */
const SMALLEST_LEVEL = 600;

export function useSheetImage(url: string | null): SheetImageState {
  const [state, setState] = useState<SheetImageState>({ is: 'loading' });
  const [attempt, setAttempt] = useState(0);
  // biome-ignore lint/correctness/useExhaustiveDependencies: a new attempt loads the same address again.
  useEffect(() => {
    setState({ is: 'loading' });
    if (url === null) return;
    const image = new Image();
    let wanted = true;
    // Before src: without it an export of the canvas would be tainted.
    image.crossOrigin = 'anonymous';
    image.decoding = 'async';
    image.src = url;
    image.decode().then(
      () => {
        if (!wanted) return;
        const { naturalWidth: width, naturalHeight: height } = image;
        setState({ is: 'ready', image: { levels: levelsOf(image, width, height), width, height } });
      },
      () => {
        if (wanted) setState({ is: 'failed', retry: () => setAttempt((n) => n + 1) });
      },
    );
    return () => {
      wanted = false;
      image.src = '';
    };
  }, [url, attempt]);
  // What failed for want of a network loads when it is back.
  useEffect(() => {
    if (state.is !== 'failed') return;
    window.addEventListener('online', state.retry);
    return () => window.removeEventListener('online', state.retry);
  }, [state]);
  return state;
}

function levelsOf(image: HTMLImageElement, width: number, height: number): SheetLevel[] {
  const levels: SheetLevel[] = [image];
  let from: SheetLevel = image;
  for (let w = width / 2, h = height / 2; Math.max(w, h) >= SMALLEST_LEVEL; w /= 2, h /= 2) {
    const half = document.createElement('canvas');
    half.width = Math.round(w);
    half.height = Math.round(h);
    const ctx = half.getContext('2d');
    if (ctx === null) break;
    ctx.imageSmoothingQuality = 'high';
    ctx.drawImage(from, 0, 0, half.width, half.height);
    levels.push(half);
    from = half;
  }
  return levels;
}

/** Draws the sheet `width × height` sheet pixels large; only the smallest level that is sharp enough is used. */
export function drawSheet(
  ctx: CanvasRenderingContext2D,
  camera: { readonly x: number; readonly y: number; readonly zoom: number },
  sheet: { readonly width: number; readonly height: number },
  image: SheetImage,
  pixelRatio: number,
): void {
  const shown = (sheet.width * camera.zoom * pixelRatio) / image.width;
  const level = Math.min(image.levels.length - 1, Math.max(0, Math.floor(-Math.log2(Math.max(shown, 1e-6)))));
  ctx.drawImage(
    image.levels[level]!,
    camera.x,
    camera.y,
    sheet.width * camera.zoom,
    sheet.height * camera.zoom,
  );
}
