/** Round steps: 1, 2 or 5 times a power of ten. */
export function valueTicks(low: number, high: number, most: number): { ticks: number[]; decimals: number } {
  if (!(high > low) || most < 1) return { ticks: [low], decimals: 0 };
  const ideal = (high - low) / most;
  const power = 10 ** Math.floor(Math.log10(ideal));
  const step =
    [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= ideal) ?? 10 * power;
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const ticks: number[] = [];
  for (let n = Math.ceil(low / step - 1e-9); n * step <= high + step * 1e-9; n += 1) ticks.push(n * step);
  return { ticks, decimals };
}
