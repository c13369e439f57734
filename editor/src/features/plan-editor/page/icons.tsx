import type { ReactNode } from 'react';
import type { ToolId } from '../tools/tool';

function Line({ children }: { readonly children: ReactNode }) {
  return (
    <svg
      viewBox="0 0 20 20"
      width="20"
      height="20"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.6"
      strokeLinecap="round"
      strokeLinejoin="round"
      aria-hidden="true"
      focusable="false"
    >
      {children}
    </svg>
  );
}

/** The tools' pictures; always beside their words. */
export function ToolIcon({ id }: { readonly id: ToolId }) {
  switch (id) {
    case 'select':
      return (
        <Line>
          <path d="M5 3.5 15.5 9l-4.6 1.4L8.6 15z" fill="currentColor" />
        </Line>
      );
    case 'transformer':
      return (
        <Line>
          <rect x="4" y="3.5" width="12" height="13" rx="1.5" />
          <path d="M7.5 13v-2M10 13v-2M12.5 13v-2M7 7h6" />
        </Line>
      );
    case 'fixture':
      return (
        <Line>
          <circle cx="10" cy="10" r="6.5" />
          <circle cx="10" cy="10" r="2.4" fill="currentColor" />
        </Line>
      );
    case 'cable':
      return (
        <Line>
          <path d="M3.5 14.5c4.5 0 3-9 6.5-9s2 9 6.5 9" />
        </Line>
      );
    case 'hub':
      return (
        <Line>
          <circle cx="10" cy="10" r="2" fill="currentColor" />
          <path d="M10 3.5V8M10 12v4.5M4.4 6.8l3.9 2.2M11.7 11l3.9 2.2M15.6 6.8 11.7 9M8.3 11l-3.9 2.2" />
        </Line>
      );
    case 'aim':
      return (
        <Line>
          <circle cx="4.8" cy="15.2" r="1.9" fill="currentColor" />
          <path d="M6.6 12.4 10 3.6M7.6 14.2l8.8-3.4" />
          <path d="M12.8 4.4v4.8M10.4 6.8h4.8" />
        </Line>
      );
    case 'face':
      return (
        <Line>
          <path d="M3.5 6.5 16.5 4v11.5l-13 1z" />
          <path d="M6.2 6v2.6M9 5.5v2.6M11.8 5v2.6M14.4 4.4V7" />
        </Line>
      );
    case 'tree':
      return (
        <Line>
          <path d="M10 17v-5.5M7.4 17h5.2" />
          <path d="M10 3c3.4 0 5.6 2.1 5.6 4.7 0 2.4-2.2 4-5.6 4s-5.6-1.6-5.6-4C4.4 5.1 6.6 3 10 3z" />
        </Line>
      );
    case 'area':
      return (
        <Line>
          <path d="M4 7.5 9.5 4l6.5 3-1.5 8.5-8 .5z" strokeDasharray="3 2.2" />
        </Line>
      );
    case 'measure':
      return (
        <Line>
          <path d="M3.5 10h13M6 7.5 3.5 10 6 12.5M14 7.5l2.5 2.5L14 12.5" />
        </Line>
      );
    case 'note':
      return (
        <Line>
          <path d="M5 4h10v8.5L11.5 16H5zM8 8h4M8 11h2.5" />
        </Line>
      );
    case 'scale':
      return (
        <Line>
          <path d="M3 13.5 13.5 3l3.5 3.5L6.5 17zM6.5 10l1.6 1.6M9.3 7.2l2.3 2.3M12 4.6l1.6 1.6" />
        </Line>
      );
  }
}

export function toolWord(id: ToolId): string {
  switch (id) {
    case 'select':
      return 'Select';
    case 'transformer':
      return 'Transformer';
    case 'fixture':
      return 'Fixture';
    case 'cable':
      return 'Cable';
    case 'hub':
      return 'Hub';
    case 'aim':
      return 'Aim';
    case 'area':
      return 'Area';
    case 'face':
      return 'Wall face';
    case 'tree':
      return 'Tree';
    case 'measure':
      return 'Measure';
    case 'note':
      return 'Note';
    case 'scale':
      return 'Scale';
  }
}

/** The letter that takes a tool up. */
export const toolKeys: Readonly<Record<string, ToolId>> = {
  v: 'select',
  t: 'transformer',
  f: 'fixture',
  c: 'cable',
  h: 'hub',
  i: 'aim',
  a: 'area',
  w: 'face',
  r: 'tree',
  m: 'measure',
  n: 'note',
  s: 'scale',
};
