import type { CSSProperties, MouseEvent } from 'react';
import type { Light } from '../share';
import styles from './mark.module.css';
import type { Spot } from './view';

export type LightChange = 'added' | 'moved' | 'replaced';

export interface ShownMark {
  readonly light: Light;
  readonly spot: Spot;
  readonly taken: boolean;
  readonly change: LightChange | null;
  readonly asked: boolean;
}

export const changeWord = (change: LightChange): string => {
  switch (change) {
    case 'added':
      return 'new';
    case 'moved':
      return 'moved';
    case 'replaced':
      return 'changed';
  }
};

const changeSign = (change: LightChange): string => {
  switch (change) {
    case 'added':
      return 'M0 -3.5V3.5M-3.5 0H3.5';
    case 'moved':
      return 'M-3.5 0H3M.5 -3 3.5 0 .5 3';
    case 'replaced':
      return 'M-3 -1.5H3.2M1.4 -3.4 3.2 -1.5M3 1.5H-3.2M-1.4 3.4 -3.2 1.5';
  }
};

export const at = ({ x, y }: Spot): CSSProperties => ({ left: `${x * 100}%`, top: `${y * 100}%` });

interface Props {
  readonly mark: ShownMark;
  readonly chosen: boolean;
  /** Others stand too close for its full size. */
  readonly small: boolean;
  readonly onPress: (event: MouseEvent) => void;
  readonly onFocus: () => void;
}

/** A light as it stands in the picture: lamp-coloured where it is part of the choice, hollow where not. */
export function LightMark({
  mark: { light, spot, taken, change, asked },
  chosen,
  small,
  onPress,
  onFocus,
}: Props) {
  const name = [
    light.tag,
    light.name,
    ...(taken ? [] : ['not chosen']),
    ...(change ? [changeWord(change)] : []),
    ...(asked ? ['has a question'] : []),
  ].join(', ');
  return (
    <button
      type="button"
      className={styles.mark}
      style={at(spot)}
      data-record={light.recordId}
      data-small={(small && !chosen) || undefined}
      aria-label={name}
      aria-expanded={chosen}
      onClick={onPress}
      onFocus={onFocus}
    >
      <svg className={styles.ring} viewBox="-20 -20 40 40" aria-hidden="true" focusable="false">
        <circle r="4.6" stroke="var(--ink)" strokeOpacity="0.5" strokeWidth="2.800" />
        <circle
          r="4.6"
          stroke="var(--paper)"
          strokeWidth="1.4"
          strokeDasharray={taken ? undefined : '2.400 1.730'}
        />
      </svg>
      <svg className={styles.picture} viewBox="-20 -20 40 40" aria-hidden="true" focusable="false">
        {chosen && <circle r="17" fill="none" stroke="var(--paper)" strokeWidth="5" />}
        {chosen && <circle r="17" fill="none" stroke="var(--ink)" strokeWidth="2" />}
        <circle r="13" fill="var(--paper)" />
        {taken ? (
          <circle r="11.2" fill="var(--lamp)" stroke="var(--ink)" strokeWidth="1.8" />
        ) : (
          <circle r="11.2" fill="none" stroke="var(--quiet)" strokeWidth="1.8" strokeDasharray="3.4 2.6" />
        )}
        <text className={styles.initial} y="4.2" textAnchor="middle">
          {light.initial}
        </text>
        <text className={styles.tag} y="3.7" textAnchor="middle">
          {light.tag}
        </text>
        {change && (
          <g transform="translate(11 -11)">
            <circle r="6.6" fill="var(--ink)" stroke="var(--paper)" strokeWidth="1.4" />
            <path d={changeSign(change)} stroke="var(--paper)" strokeWidth="1.5" fill="none" />
          </g>
        )}
        {asked && (
          <g transform="translate(11 11)">
            <circle r="6.6" fill="var(--dusk)" stroke="var(--paper)" strokeWidth="1.4" />
            <text className={styles.sign} y="3.4" textAnchor="middle">
              ?
            </text>
          </g>
        )}
      </svg>
    </button>
  );
}

/** A question about a place. */
export function QuestionPin({
  spot,
  label,
  onPress,
}: {
  readonly spot: Spot;
  readonly label: string;
  readonly onPress: () => void;
}) {
  return (
    <button type="button" className={styles.mark} style={at(spot)} aria-label={label} onClick={onPress}>
      <PinPicture />
    </button>
  );
}

/** A place that is being asked about, and not a question yet. */
export const Pin = ({ spot }: { readonly spot: Spot }) => (
  <span className={styles.mark} data-still="" style={at(spot)}>
    <PinPicture />
  </span>
);

const PinPicture = () => (
  <svg className={styles.picture} viewBox="-20 -20 40 40" aria-hidden="true" focusable="false">
    <path
      d="M0 0C-7 -7 -9 -9.500 -9 -13A9 9 0 0 1 9 -13C9 -9.500 7 -7 0 0Z"
      fill="var(--dusk)"
      stroke="var(--paper)"
      strokeWidth="1.6"
    />
    <text className={styles.sign} y="-9" textAnchor="middle">
      ?
    </text>
  </svg>
);
