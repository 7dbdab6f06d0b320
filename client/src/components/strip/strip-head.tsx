/** Column head over row strips: the ticks − 0 + stand above the posts and zero of every strip below. */
export function StripHead({ label = 'error' }: { label?: string }) {
  return (
    <svg
      width="120"
      height="22"
      viewBox="0 0 120 22"
      role="img"
      aria-label={`${label}, from minus tolerance to plus tolerance`}
    >
      <path d="M20 16V22M60 18V22M100 16V22" stroke="var(--ink-3)" />
      <g fontSize="13" fill="var(--ink-3)" textAnchor="middle">
        <text x="20" y="11">
          −
        </text>
        <text x="60" y="11">
          {label}
        </text>
        <text x="100" y="11">
          +
        </text>
      </g>
    </svg>
  );
}
