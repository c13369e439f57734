/** Short messages at the foot of the window, kept outside of React so that anything may show one. */
export interface ToastInput {
  readonly message: string;
  /** 'problem' stays until it is closed. */
  readonly tone?: 'plain' | 'problem';
  /** Puts back what was just done; the toast then closes. A rejection is shown as a problem. */
  readonly undo?: () => unknown;
  readonly undoLabel?: string;
}

export interface Toast extends Required<Pick<ToastInput, 'message' | 'tone'>> {
  readonly id: number;
  readonly undo?: ToastInput['undo'];
  readonly undoLabel: string;
  /** Milliseconds until it closes by itself; null: never. */
  readonly lifeMs: number | null;
}

/** Long enough to read and reach (WCAG 2.2.1: hovering or focusing holds it open). */
const PLAIN_MS = 6_000;
const UNDO_MS = 12_000;
const MOST_SHOWN = 3;

type Listener = () => void;
let toasts: readonly Toast[] = [];
let nextId = 1;
const listeners = new Set<Listener>();

function publish(next: readonly Toast[]): void {
  toasts = next;
  for (const listener of listeners) listener();
}

export const subscribeToasts = (listener: Listener): (() => void) => {
  listeners.add(listener);
  return () => listeners.delete(listener);
};
export const currentToasts = (): readonly Toast[] => toasts;

/** Shows a message and gives its id. The oldest of more than three gives way. */
export function showToast(input: ToastInput): number {
  const tone = input.tone ?? 'plain';
  const toast: Toast = {
    id: nextId++,
    message: input.message,
    tone,
    undo: input.undo,
    undoLabel: input.undoLabel ?? 'Undo',
    lifeMs: tone === 'problem' ? null : input.undo ? UNDO_MS : PLAIN_MS,
  };
  publish([...toasts, toast].slice(-MOST_SHOWN));
  return toast.id;
}

export const showProblem = (message: string): number => showToast({ message, tone: 'problem' });

export function closeToast(id: number): void {
  publish(toasts.filter((toast) => toast.id !== id));
}
