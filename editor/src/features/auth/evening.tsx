import styles from './front.module.css';

/** Path lights along a garden walk, near to far: x, y of the foot and the scale of each. */
const lights = [
  { x: 236, y: 838, s: 1.5 },
  { x: 556, y: 742, s: 1.14 },
  { x: 352, y: 668, s: 0.88 },
  { x: 548, y: 612, s: 0.68 },
  { x: 424, y: 570, s: 0.53 },
  { x: 530, y: 538, s: 0.42 },
] as const;

/** A picture for the margin: dusk over a garden, a walk lit from one end to the other. Says nothing. */
export function Evening() {
  return (
    <div className={styles.evening}>
      <svg viewBox="0 0 800 900" preserveAspectRatio="xMidYMax slice" aria-hidden="true" focusable="false">
        <defs>
          <linearGradient id="evening-sky" x1="0" y1="0" x2="0" y2="1">
            <stop offset="0" stopColor="#16202e" />
            <stop offset="0.62" stopColor="#2b3a55" />
            <stop offset="0.92" stopColor="#6a6470" />
            <stop offset="1" stopColor="#a9835a" />
          </linearGradient>
          <linearGradient id="evening-lawn" x1="0" y1="0" x2="0" y2="1">
            <stop offset="0" stopColor="#1c2735" />
            <stop offset="1" stopColor="#111923" />
          </linearGradient>
          <radialGradient id="evening-pool">
            <stop offset="0" stopColor="#f7cf88" stopOpacity="0.95" />
            <stop offset="0.28" stopColor="#e8a33d" stopOpacity="0.55" />
            <stop offset="1" stopColor="#e8a33d" stopOpacity="0" />
          </radialGradient>
          <radialGradient id="evening-glow">
            <stop offset="0" stopColor="#f7cf88" stopOpacity="0.55" />
            <stop offset="1" stopColor="#e8a33d" stopOpacity="0" />
          </radialGradient>
        </defs>
        <rect width="800" height="520" fill="url(#evening-sky)" />
        <rect y="500" width="800" height="400" fill="url(#evening-lawn)" />
        {/* The house: a low roof, two lit windows. */}
        <path d="M420 500V412h-22l150-84h92l150 84h-22v88z" fill="#121a25" />
        <path d="M470 440h34v30h-34zM680 440h34v30h-34z" fill="#e8a33d" opacity="0.75" />
        <path d="M560 432h64v68h-64z" fill="#f0c274" opacity="0.5" />
        {/* Hedge and trees. */}
        <path
          d="M0 512v-64c30-26 66-30 92-12 20-44 74-52 104-18 34-22 78-10 88 26 26-8 52 4 58 28l8 40zM770 512v-52c8-14 20-20 30-20v72z"
          fill="#141d29"
        />
        {/* The walk. */}
        <path
          d="M214 900C420 800 250 700 420 636c90-34 70-84 112-136h34C548 556 560 600 470 654c-120 72 60 150-20 246z"
          fill="#1f2a39"
        />
        {lights.map(({ x, y, s }) => (
          <g key={x} transform={`translate(${x} ${y}) scale(${s})`}>
            <ellipse rx="150" ry="46" fill="url(#evening-pool)" opacity="0.85" />
            <circle cy="-84" r="64" fill="url(#evening-glow)" />
            <path d="M-2.5 0v-84h5V0z" fill="#0d131b" />
            <path d="M-26-84a26 22 0 0 1 52 0z" fill="#0d131b" />
            <path d="M-12-83h24l3 6h-30z" fill="#fbe3b4" />
          </g>
        ))}
      </svg>
    </div>
  );
}
