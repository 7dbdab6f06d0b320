export interface ChartColours {
  ink: string;
  ink2: string;
  ink3: string;
  rule: string;
  edge: string;
  kelp: string;
  stop: string;
  sheet: string;
  paper: string;
}

/** The theme's colours where a canvas stands; a canvas cannot use CSS variables itself. */
export function readChartColours(element: Element): ChartColours {
  const style = getComputedStyle(element);
  const read = (name: string) => style.getPropertyValue(name).trim() || '#000';
  return {
    ink: read('--ink'),
    ink2: read('--ink-2'),
    ink3: read('--ink-3'),
    rule: read('--rule'),
    edge: read('--edge'),
    kelp: read('--kelp'),
    stop: read('--stop'),
    sheet: read('--sheet'),
    paper: read('--paper'),
  };
}

/** A #rrggbb colour made translucent. */
export function withAlpha(hex: string, alpha: number): string {
  const digits = Math.round(alpha * 255)
    .toString(16)
    .padStart(2, '0');
  return `${hex}${digits}`;
}
