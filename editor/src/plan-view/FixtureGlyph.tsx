import { BURST_POINTS } from './draw/fixture';
import { type FixtureLook, groundOf } from './fixture-look';
import { chalk, dimBlue, grey, ink, overRed, paper } from './palette';

/** A fixture's mark as a small picture in running text: ledger, legend, profile. Never the only carrier of a fact. */
export function FixtureGlyph({ look, size = 14 }: { readonly look: FixtureLook; readonly size?: number }) {
  return (
    <svg width={size} height={size} viewBox="-10 -10 20 20" aria-hidden="true" focusable="false">
      <FixtureGlyphShape look={look} />
    </svg>
  );
}

/** The mark alone, about the origin, 18 units wide, for a picture that has a frame of its own. */
export function FixtureGlyphShape({ look }: { readonly look: FixtureLook }) {
  switch (look.kind) {
    case 'in-window':
      return (
        <g>
          <circle r="9.5" fill={paper} />
          <circle r="7.4" fill={groundOf(look)} stroke={ink} strokeWidth="2.4" />
          {look.notch !== null && (
            <path
              d="M -3 8.6 L 3 8.6 L 0 3.6 Z"
              fill={ink}
              transform={look.notch === 'above' ? 'scale(1 -1)' : undefined}
            />
          )}
        </g>
      );
    case 'dim':
      return (
        <g>
          <circle r="9.5" fill={paper} />
          <path d="M -7.4 0 A 7.4 7.4 0 0 0 7.4 0 Z" fill={dimBlue} />
          <circle r="7.4" fill="none" stroke={dimBlue} strokeWidth="2.6" />
        </g>
      );
    case 'overdriven':
      return (
        <g>
          <path d={burst(9.8, 6.2)} fill={overRed} />
          <circle r="3.2" fill={paper} />
        </g>
      );
    case 'dark':
      return (
        <g>
          <circle r="9.5" fill={paper} />
          <circle r="8.4" fill={ink} />
          <path
            d="M -3.4 -3.4 L 3.4 3.4 M -3.4 3.4 L 3.4 -3.4"
            stroke={paper}
            strokeWidth="2.2"
            strokeLinecap="round"
          />
        </g>
      );
    case 'off':
      return (
        <g>
          <circle r="7.4" fill={paper} stroke={grey} strokeWidth="2.2" />
          <path d="M -7.4 0 H 7.4" stroke={grey} strokeWidth="2.2" />
        </g>
      );
    case 'unwired':
      return (
        <g>
          <circle r="9.5" fill={paper} />
          <circle r="7.4" fill="none" stroke={ink} strokeWidth="2.2" strokeDasharray="3.4 2.4" />
        </g>
      );
    case 'waiting':
      return <circle r="7.4" fill={chalk} stroke={grey} strokeWidth="2" />;
  }
}

function burst(outer: number, inner: number): string {
  const points = Array.from({ length: BURST_POINTS * 2 }, (_, i) => {
    const r = i % 2 === 0 ? outer : inner;
    const a = (i / (BURST_POINTS * 2)) * Math.PI * 2 - Math.PI / 2;
    return `${(r * Math.cos(a)).toFixed(2)} ${(r * Math.sin(a)).toFixed(2)}`;
  });
  return `M ${points.join(' L ')} Z`;
}
