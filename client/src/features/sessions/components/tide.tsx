/** The picture of the sign-in page: lines a falling tide left on salt, and crystals on them. One drawing, always the same. */

const WIDTH = 1440;
/** Water line, px from the top. */
const LEVEL = 560;
const LINES = 30;
const CRYSTALS = 64;
const SEED = 11;

interface Line {
  d: string;
  width: number;
  opacity: number;
  dashes: string | undefined;
}

interface Crystal {
  x: number;
  y: number;
  size: number;
  opacity: number;
}

const round = (value: number) => Math.round(value * 100) / 100;

/** A linear congruential generator: the drawing must not change from visit to visit. */
function generator(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 1_664_525 + 1_013_904_223) % 4_294_967_296;
    return state / 4_294_967_296;
  };
}

/** Lines lie closer together towards the water. */
const lineAt = (share: number) => LEVEL - 8 - share ** 1.55 * LEVEL * 0.93;

function drawLine(index: number, next: () => number): Line {
  const share = index / (LINES - 1);
  const height = 1.2 + share * 5.5;
  const [long, short] = [next() * 6, next() * 6];
  const points: string[] = [];
  for (let x = -10; x <= WIDTH + 10; x += 12) {
    const swell = Math.sin(x / 170 + long) + 0.55 * Math.sin(x / 61 + short) + 0.25 * (next() - 0.5);
    points.push(`${x} ${round(lineAt(share) + height * swell)}`);
  }
  return {
    d: `M${points.join('L')}`,
    width: round(1.5 - share * 0.9),
    opacity: round(0.5 * (1 - share) ** 1.3 + 0.035),
    dashes: index % 3 === 1 ? `${Math.floor(40 + next() * 220)} ${Math.floor(8 + next() * 40)}` : undefined,
  };
}

function drawCrystal(next: () => number): Crystal {
  const share = next() ** 0.9 * 0.75;
  const y = lineAt(share);
  return {
    x: round(next() * WIDTH),
    y: round(y),
    size: round(2.5 + next() * 5.5 * (1 - share)),
    opacity: round(0.75 * (1 - share) + 0.12),
  };
}

function drawTide(): { lines: Line[]; crystals: Crystal[] } {
  const next = generator(SEED);
  return {
    lines: Array.from({ length: LINES }, (_, i) => drawLine(i, next)),
    crystals: Array.from({ length: CRYSTALS }, () => drawCrystal(next)),
  };
}

const tide = drawTide();

export function Tide() {
  return (
    <svg
      className="threshold-tide"
      viewBox={`0 0 ${WIDTH} ${LEVEL}`}
      preserveAspectRatio="xMidYMax slice"
      aria-hidden="true"
    >
      {tide.lines.map((line) => (
        <path
          key={line.d}
          d={line.d}
          fill="none"
          stroke="var(--ink)"
          strokeWidth={line.width}
          opacity={line.opacity}
          strokeDasharray={line.dashes}
        />
      ))}
      {tide.crystals.map(({ x, y, size, opacity }) => (
        <rect
          key={`${x}-${y}`}
          x={x - size / 2}
          y={y - size}
          width={size}
          height={size}
          fill="var(--paper)"
          stroke="var(--ink)"
          opacity={opacity}
        />
      ))}
    </svg>
  );
}

/** The word mark stands on the water; what is under the line is drawn in salt. */
export function WordMark() {
  return (
    <svg className="threshold-mark" viewBox="0 0 680 200" aria-hidden="true">
      <path d="M6 60V120M150 60V120" stroke="var(--ink)" strokeWidth="10" />
      <path d="M48 120V71H108V120" fill="var(--paper)" stroke="var(--ink)" strokeWidth="10" />
      <path d="M6 120V180M150 120V180" stroke="var(--mark-under)" strokeWidth="10" />
      <path d="M43 120H113V174H43Z" fill="#6CCBBC" />
      <text x="190" y="119" fontSize="116" fontWeight="700" fill="var(--ink)" letterSpacing="-8">
        Saltmark
      </text>
    </svg>
  );
}
