import type Konva from 'konva';
import type { Context } from 'konva/lib/Context';
import { type KeyboardEvent, useCallback, useEffect, useMemo, useRef, useState } from 'react';
import { Layer, Shape, Stage } from 'react-konva';
import { clearLabelWidths } from '../../../plan-view/draw/labels';
import { chalk, fontFamily } from '../../../plan-view/palette';
import nightStyles from '../night/night-page.module.css';
import { useGroundFigures } from '../night/use-ground-figures';
import { useNightPicture } from '../night/use-night-picture';
import { useEditor, useSheet } from '../page/context';
import styles from './canvas.module.css';
import { canvasKey } from './keys';
import { type LayerName, Painter } from './painter';
import { requestPreview } from './request-preview';
import { drawSheet, useSheetImage } from './sheet-image';
import { usePointerInput } from './use-pointer-input';
import { useScene } from './use-scene';

/** More pixels than this a device pixel are not seen, and cost memory that phones don't have. */
const MAX_PIXEL_RATIO = 2;
const pixelRatio = Math.min(MAX_PIXEL_RATIO, globalThis.devicePixelRatio || 1);
const layerNames: readonly LayerName[] = ['ground', 'cable', 'fixtures', 'overlay'];

/** The same preview for the same request, so that nothing is painted anew without need. */
function rememberLast<A, R>(make: (a: A) => R): (a: A) => R {
  let last: { readonly of: A; readonly made: R } | null = null;
  return (of) => {
    if (last === null || last.of !== of) last = { of, made: make(of) };
    return last.made;
  };
}

/**
 * The drawing. Five layers, none of which listens: what lies under the pointer is found by the tools, from
 * the plan itself. Moves of the view, the pointer and the tool paint layers directly, without React.
 */
export function PlanCanvas({ imageUrl }: { readonly imageUrl: string | null }) {
  const editor = useEditor();
  const sheet = useSheet();
  const image = useSheetImage(imageUrl);
  const { scene, lengthText, aimOf } = useScene();
  const frame = useRef<HTMLDivElement>(null);
  const sheetLayer = useRef<Konva.Layer>(null);
  const layers = useRef(new Map<LayerName, Konva.Layer>());
  const painter = useMemo(() => new Painter(pixelRatio), []);
  const [size, setSize] = useState({ width: 0, height: 0 });
  const panning = usePointerInput(frame, editor);
  const redrawSheet = useCallback(() => {
    sheetLayer.current?.batchDraw();
  }, []);
  const atNight = useNightPicture(image, redrawSheet);
  const groundFigures = useGroundFigures();

  const update = useCallback(
    (next: Parameters<Painter['update']>[0]) => {
      for (const name of painter.update(next)) layers.current.get(name)?.batchDraw();
    },
    [painter],
  );

  useEffect(() => {
    const element = frame.current;
    if (element === null) return;
    const observer = new ResizeObserver(() => {
      const next = { width: element.clientWidth, height: element.clientHeight };
      setSize(next);
      editor.camera.resize(next);
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, [editor]);

  const width = sheet?.widthPx ?? 0;
  const height = sheet?.heightPx ?? 0;
  // biome-ignore lint/correctness/useExhaustiveDependencies: another sheet is fitted even when it is as large.
  useEffect(() => {
    if (width > 0) editor.camera.show({ width, height });
  }, [editor, sheet?.id, width, height]);

  useEffect(() => update({ scene, lengthText, aimOf }), [update, scene, lengthText, aimOf]);
  useEffect(() => update({ groundFigures }), [update, groundFigures]);

  useEffect(() => {
    const { camera, session, tools, estimate } = editor;
    const keptPreview = rememberLast(requestPreview);
    const all = () =>
      update({
        ...camera.state.getState(),
        selection: session.getState().selection,
        hoveredId: session.getState().hoveredId,
        preview:
          keptPreview(session.getState().request) ??
          tools.state.getState().preview ??
          session.getState().proposed,
        stale: estimate.state.getState().stale,
        night: session.getState().mode === 'night',
      });
    all();
    const undo = [
      camera.state.subscribe(() => {
        all();
        sheetLayer.current?.batchDraw();
      }),
      session.subscribe(all),
      tools.state.subscribe(all),
      estimate.state.subscribe(all),
    ];
    return () => {
      for (const stop of undo) stop();
    };
  }, [editor, update]);

  useEffect(() => {
    let wanted = true;
    Promise.all([
      document.fonts.load(`600 12px ${fontFamily}`),
      document.fonts.load(`500 12px ${fontFamily}`),
    ])
      .catch(() => [])
      .then(() => {
        if (!wanted) return;
        painter.forgetPictures();
        clearLabelWidths();
        for (const layer of layers.current.values()) layer.batchDraw();
      });
    return () => {
      wanted = false;
    };
  }, [painter]);

  const paintSheet = useCallback(
    (context: Context) => {
      const { camera } = painter.current;
      const ctx = context._context;
      if (image.is === 'ready' && width > 0) {
        drawSheet(ctx, camera, { width, height }, atNight.current ?? image.image, pixelRatio);
        return;
      }
      ctx.fillStyle = chalk;
      ctx.fillRect(camera.x, camera.y, width * camera.zoom, height * camera.zoom);
    },
    [painter, image, atNight, width, height],
  );

  const onKeyDown = (event: KeyboardEvent) => {
    if (canvasKey(editor, event.nativeEvent)) event.preventDefault();
  };

  return (
    <section
      ref={frame}
      className={`${styles.frame} ${nightStyles.frame}`}
      data-panning={panning || undefined}
      data-testid="plan-canvas"
      aria-label="Drawing. Arrow keys move the view, plus and minus zoom, 0 fits it. Everything on it is in the ledger too."
      // biome-ignore lint/a11y/noNoninteractiveTabindex: the drawing takes keys, to pan and zoom.
      tabIndex={0}
      onKeyDown={onKeyDown}
    >
      {size.width > 0 && size.height > 0 && (
        <Stage width={size.width} height={size.height} pixelRatio={pixelRatio} listening={false}>
          <Layer ref={sheetLayer} listening={false}>
            <Shape sceneFunc={paintSheet} listening={false} perfectDrawEnabled={false} />
          </Layer>
          {layerNames.map((name) => (
            <Layer
              key={name}
              listening={false}
              ref={(layer: Konva.Layer | null) => {
                if (layer === null) layers.current.delete(name);
                else layers.current.set(name, layer);
              }}
            >
              <Shape
                sceneFunc={(context: Context) => painter.paint(name, context._context)}
                listening={false}
                perfectDrawEnabled={false}
              />
            </Layer>
          ))}
        </Stage>
      )}
      {image.is === 'loading' && imageUrl !== null && (
        <p className={styles.notice} role="status">
          Loading the sheet…
        </p>
      )}
      {image.is === 'failed' && (
        <p className={styles.notice} role="alert">
          The picture of this sheet did not load.{' '}
          <button type="button" className={styles.link} onClick={image.retry}>
            Try again
          </button>
        </p>
      )}
    </section>
  );
}
