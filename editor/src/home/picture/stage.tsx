import {
  type CSSProperties,
  type KeyboardEvent,
  type MouseEvent,
  type ReactNode,
  useEffect,
  useLayoutEffect,
  useRef,
  useState,
} from 'react';
import type { Evening } from '../night/use-evening';
import type { Picture } from '../share';
import { Crosshair } from './crosshair';
import { at, LightMark, Pin, QuestionPin, type ShownMark } from './mark';
import { boxOf, frameOf, pixelOf, spotOf } from './sheet-box';
import styles from './stage.module.css';
import { useCrowded } from './use-crowded';
import { useGestures } from './use-gestures';
import { panned, showing, under, type View, whole, zoomed } from './view';

const ZOOM_STEP = 1.6;
const PAN_STEP = 0.15;
/** Half of the 44 px that a finger needs. */
const FINGER_PX = 22;

export interface Place {
  readonly x: number;
  readonly y: number;
}

export interface ShownPin extends Place {
  readonly questionId: string;
  readonly label: string;
}

interface Props {
  readonly picture: Picture;
  readonly evening: Evening;
  readonly name: string;
  readonly marks: readonly ShownMark[];
  readonly pins: readonly ShownPin[];
  /** A place that is being asked about. */
  readonly pending: Place | null;
  readonly chosenId: string | null;
  readonly onChoose: (recordId: string) => void;
  readonly onPin: (questionId: string) => void;
  /** A place is being looked for: what is pressed is a place, not a light. */
  readonly placing: boolean;
  readonly onPlace: (place: Place) => void;
  readonly onPlacingEnd: () => void;
  /** Beside the buttons that zoom. */
  readonly children?: ReactNode;
}

/** The picture with its marks, in a frame in which it can be moved and zoomed. */
export function Stage(props: Props) {
  const { picture, evening, marks, pins, pending, placing } = props;
  const frame = useRef<HTMLDivElement>(null);
  const [view, setView] = useState<View>(whole);
  useGestures(frame, view, setView);
  const crowded = useCrowded(frame, view, marks);

  /** Where marks overlap, a finger means the one whose middle is nearest, not the one that lies on top. */
  const pressMark = (mark: ShownMark, event: MouseEvent): void => {
    // Enter and the space bar press without a place.
    const meant = event.detail === 0 ? null : nearest(frame.current, view, marks, event);
    props.onChoose((meant ?? mark).light.recordId);
  };

  /** A finger that came down beside the marks means the nearest, if it is near. */
  const pressBeside = (event: MouseEvent): void => {
    if (event.target instanceof Element && event.target.closest('button')) return;
    const meant = nearest(frame.current, view, marks, event);
    if (meant) props.onChoose(meant.light.recordId);
  };

  const keys = (event: KeyboardEvent): void => {
    const next = placing ? null : keyed(view, event.key);
    if (!next || event.ctrlKey || event.metaKey || event.altKey) return;
    event.preventDefault();
    setView(next);
  };

  const shape = {
    ['--shape' as string]: frameOf(picture),
    ['--evening' as string]: `${evening.heightPx}px`,
  };

  return (
    <div className={styles.stage} style={shape}>
      {/* biome-ignore lint/a11y/useSemanticElements: a fieldset would be taken for a form */}
      <div
        ref={frame}
        className={styles.frame}
        role="group"
        aria-label={`${props.name}: picture with ${marks.length} lights. Plus and minus zoom, arrow keys move it.`}
        // biome-ignore lint/a11y/noNoninteractiveTabindex: it can be moved and zoomed by keyboard
        tabIndex={0}
        data-zoomed={view.zoom > 1 || undefined}
        data-placing={placing || undefined}
        data-dark={evening.dark || undefined}
        onKeyDown={keys}
        onClick={pressBeside}
      >
        <div
          className={styles.world}
          style={{
            ['--zoom' as string]: view.zoom,
            transform: `translate(${view.x * 100}%, ${view.y * 100}%) scale(${view.zoom})`,
          }}
        >
          <SheetImage picture={picture} closeUp={view.zoom > 1} onLoaded={evening.onPhoto} />
          {evening.over(imageStyle(picture))}
          {marks.map((mark) => (
            <LightMark
              key={mark.light.recordId}
              mark={mark}
              chosen={mark.light.recordId === props.chosenId}
              small={crowded.has(mark)}
              onPress={(event) => pressMark(mark, event)}
              onFocus={() => setView((seen) => showing(seen, mark.spot))}
            />
          ))}
          {pins.map((pin) => (
            <QuestionPin
              key={pin.questionId}
              spot={spotOf(picture, pin)}
              label={pin.label}
              onPress={() => props.onPin(pin.questionId)}
            />
          ))}
          {pending && <Pin spot={spotOf(picture, pending)} />}
        </div>
        {placing && (
          <Crosshair
            onPlace={(spot) => props.onPlace(pixelOf(picture, under(view, spot)))}
            onCancel={props.onPlacingEnd}
          />
        )}
      </div>
      {evening.line}
      <div className={styles.below}>
        {props.children}
        <div className={styles.tools}>
          {evening.offered && (
            <Tool
              label="By daylight"
              pressed={evening.byDay}
              off={evening.toggle === null}
              onPress={() => evening.toggle?.()}
            >
              <circle cx="10" cy="10" r="3.400" />
              <path d="M10 1.800v1.700M10 16.500v1.700M1.800 10h1.700M16.500 10h1.700M4.200 4.200l1.200 1.200M14.600 14.600l1.200 1.200M15.800 4.200l-1.200 1.200M5.400 14.600l-1.200 1.200" />
            </Tool>
          )}
          <Tool label="Zoom in" onPress={() => setView(zoomed(view, ZOOM_STEP))}>
            <path d="M10 4.500v11M4.500 10h11" />
          </Tool>
          <Tool label="Zoom out" off={view.zoom === 1} onPress={() => setView(zoomed(view, 1 / ZOOM_STEP))}>
            <path d="M4.500 10h11" />
          </Tool>
          <Tool label="Show the whole picture" off={view.zoom === 1} onPress={() => setView(whole)}>
            <path d="M4 8V4h4M12 4h4v4M16 12v4h-4M8 16H4v-4" />
          </Tool>
        </div>
      </div>
    </div>
  );
}

function keyed(view: View, key: string): View | null {
  switch (key) {
    case '+':
    case '=':
      return zoomed(view, ZOOM_STEP);
    case '-':
      return zoomed(view, 1 / ZOOM_STEP);
    case '0':
      return whole;
    default:
      break;
  }
  // Arrow keys scroll the page while there is nothing to move.
  if (view.zoom === 1) return null;
  switch (key) {
    case 'ArrowLeft':
      return panned(view, PAN_STEP, 0);
    case 'ArrowRight':
      return panned(view, -PAN_STEP, 0);
    case 'ArrowUp':
      return panned(view, 0, PAN_STEP);
    case 'ArrowDown':
      return panned(view, 0, -PAN_STEP);
    default:
      return null;
  }
}

function nearest(
  frame: HTMLElement | null,
  view: View,
  marks: readonly ShownMark[],
  { clientX, clientY }: { clientX: number; clientY: number },
): ShownMark | null {
  if (!frame) return null;
  const box = frame.getBoundingClientRect();
  let found: ShownMark | null = null;
  let least = FINGER_PX;
  for (const mark of marks) {
    const x = box.left + (view.x + mark.spot.x * view.zoom) * box.width;
    const y = box.top + (view.y + mark.spot.y * view.zoom) * box.height;
    const away = Math.hypot(x - clientX, y - clientY);
    if (away > least) continue;
    found = mark;
    least = away;
  }
  return found;
}

/** Where the photo, and what is drawn over it, lie in the frame. */
function imageStyle(picture: Picture): CSSProperties {
  const box = boxOf(picture);
  return {
    ...at({ x: box.left, y: box.top }),
    width: `${box.width * 100}%`,
    height: `${box.height * 100}%`,
  };
}

/** The light one first where it is enough; from the first close look on the whole one, once it has come. */
function SheetImage({
  picture,
  closeUp,
  onLoaded,
}: {
  readonly picture: Picture;
  readonly closeUp: boolean;
  readonly onLoaded: (image: HTMLImageElement) => void;
}) {
  const [attempt, setAttempt] = useState(0);
  const [failed, setFailed] = useState(false);
  const whole = useLoaded(closeUp ? picture.url : null);
  // Another picture in the same place begins anew.
  // biome-ignore lint/correctness/useExhaustiveDependencies: the address is what is new
  useLayoutEffect(() => setFailed(false), [picture.url]);
  if (failed)
    return (
      <div className={styles.failed}>
        <p>The picture did not load.</p>
        <button
          type="button"
          className="button"
          onClick={() => {
            setFailed(false);
            setAttempt(attempt + 1);
          }}
        >
          Try again
        </button>
      </div>
    );
  return (
    <picture>
      {!whole && <source media={picture.light.media} srcSet={picture.light.url} />}
      <img
        key={attempt}
        className={styles.image}
        style={imageStyle(picture)}
        src={picture.url}
        width={picture.widthPx}
        height={picture.heightPx}
        alt=""
        fetchPriority="high"
        decoding="async"
        draggable={false}
        onLoad={(event) => onLoaded(event.currentTarget)}
        onError={() => setFailed(true)}
      />
    </picture>
  );
}

/** Whether a picture, once it was asked for by its address, has come; one that fails is asked for again. */
function useLoaded(url: string | null): boolean {
  const [loaded, setLoaded] = useState<string | null>(null);
  useEffect(() => {
    if (url === null) return;
    const image = new Image();
    image.onload = () => setLoaded(url);
    image.src = url;
    return () => {
      image.onload = null;
    };
  }, [url]);
  return loaded !== null;
}

function Tool({
  label,
  pressed,
  off = false,
  onPress,
  children,
}: {
  readonly label: string;
  readonly pressed?: boolean;
  readonly off?: boolean;
  readonly onPress: () => void;
  readonly children: ReactNode;
}) {
  return (
    <button
      type="button"
      className={styles.tool}
      aria-label={label}
      title={label}
      // Kept in the tab order: one that vanishes at its own press loses the focus.
      aria-disabled={off}
      aria-pressed={pressed}
      onClick={() => !off && onPress()}
    >
      <svg viewBox="0 0 20 20" aria-hidden="true" focusable="false">
        {children}
      </svg>
    </button>
  );
}
