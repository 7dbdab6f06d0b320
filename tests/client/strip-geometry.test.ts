import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  hatchPath,
  markerPaths,
  outcomeByGuardBand,
  stripGeometry,
} from '../../shared/format/strip-geometry.ts';
import { STRIP_MEASURES } from '../../shared/format/strip-sizes.ts';

const base = { tolerance: 3, guardBand: 0.85, expandedUncertainty: 0.85, what: 'As left' };
const hard = '\u00a0';

describe('the outcome by guard band', () => {
  it.each([
    [2.15, 'within-clear'],
    [-2.15, 'within-clear'],
    [2.16, 'within-unsure'],
    [3, 'within-unsure'],
    [3.01, 'outside-unsure'],
    [-3.85, 'outside-unsure'],
    [3.86, 'outside-clear'],
  ])('of %f %% at T = 3 %%, w = 0.85 %% is %s', (error, outcome) => {
    expect(outcomeByGuardBand(error, 3, 0.85)).toBe(outcome);
  });
});

describe('where things stand', () => {
  it('puts posts one unit from the centre at every size', () => {
    for (const size of ['row', 'page', 'bench'] as const) {
      const { posts } = stripGeometry(base, size);
      const { width, unit } = STRIP_MEASURES[size];
      expect(posts).toEqual([width / 2 - unit, width / 2 + unit]);
    }
  });

  it('places the dot in proportion and draws both caps while they fit', () => {
    const { result } = stripGeometry({ ...base, error: 1.5 }, 'page');
    expect(result).toMatchObject({ x: 320 + 100, isOffScale: false });
    expect(result?.whisker?.caps).toHaveLength(2);
  });

  it('cuts a cap that lies beyond the run-out', () => {
    const { result } = stripGeometry({ ...base, error: -4.17 }, 'page');
    expect(result?.whisker?.caps).toHaveLength(1);
    expect(result?.whisker?.from).toBe(20);
  });

  it('prints the figure of an off-scale result in a row too, with chevrons and no whisker', () => {
    const { result } = stripGeometry({ ...base, error: 9.69 }, 'row');
    expect(result).toMatchObject({ isOffScale: true, whisker: null, outcome: 'outside-clear' });
    expect(result?.chevrons).toHaveLength(2);
    expect(result?.figure).toMatchObject({ text: '+9.7', anchor: 'end' });
  });

  it('prints no figure in a row that is on scale', () => {
    expect(stripGeometry({ ...base, error: 1 }, 'row').result?.figure).toBeNull();
  });

  it('keeps the figure inside the drawing wherever the error is', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -50, max: 50, noNaN: true }),
        fc.constantFrom('page', 'bench'),
        (error, size) => {
          const { result, measures } = stripGeometry({ ...base, error }, size as 'page' | 'bench');
          const figure = result?.figure;
          const half = ((figure?.text.length ?? 0) * (figure?.fontSize ?? 0) * 0.6) / 2;
          expect((figure?.x ?? 0) - half).toBeGreaterThanOrEqual(0);
          expect((figure?.x ?? 0) + half).toBeLessThanOrEqual(measures.width);
        },
      ),
    );
  });

  it('lets a scale figure give way to the result', () => {
    const texts = (error: number) =>
      stripGeometry({ ...base, error }, 'bench').scale.map((mark) => mark.text);
    expect(texts(0)).toEqual([`−3${hard}%`, `+3${hard}%`]);
    expect(texts(-2.58)).toEqual(['0', `+3${hard}%`]);
  });

  it('sinks earlier results lower the older they are, oldest drawn first', () => {
    const { wake } = stripGeometry({ ...base, error: 1, earlier: [0.6, 0.1, -0.5, -2] }, 'page');
    expect(wake.map((dot) => dot.y)).toEqual([43, 39, 34]);
    expect(wake.map((dot) => dot.opacity)).toEqual([0.24, 0.4, 0.62]);
  });

  it('omits the caret without a forecast and beyond the scale', () => {
    expect(stripGeometry({ ...base, error: 1 }, 'page').caret).toBeNull();
    expect(stripGeometry({ ...base, error: 1, forecast: 6 }, 'page').caret).toBeNull();
    expect(stripGeometry({ ...base, error: 1, forecast: 1.7 }, 'page').caret).not.toBeNull();
  });
});

describe('a closed strip', () => {
  it('betrays neither the result nor the past, in drawing or in words', () => {
    const closed = {
      ...base,
      error: -1.1,
      earlier: [-0.7],
      forecast: -1.3,
      closed: 'shown after the last replicate',
    };
    const strip = stripGeometry(closed, 'bench');
    expect(strip).toMatchObject({ result: null, caret: null, wake: [] });
    expect(JSON.stringify(strip)).not.toMatch(/1\.1|0\.7|1\.3/);
    expect(strip.words).toBe(`Shown after the last replicate. Tolerance ±3${hard}%.`);
  });
});

describe('marks', () => {
  it('are round within and pointed outside, halved only when not sure', () => {
    const mark = (outcome: Parameters<typeof markerPaths>[0]) => markerPaths(outcome, 10, 10, 6, 1);
    expect(mark('within-clear').shape).toContain('A');
    expect(mark('outside-clear').shape).not.toContain('A');
    expect(mark('within-clear').half).toBeNull();
    expect(mark('outside-clear').half).toBeNull();
  });

  it('open towards the limit in doubt', () => {
    // Within at the upper post: the filled half is the inner one, drawn anticlockwise (sweep 0).
    expect(markerPaths('within-unsure', 10, 10, 6, 1).half).toContain('0 0 0');
    expect(markerPaths('within-unsure', 10, 10, 6, -1).half).toContain('0 0 1');
    // Outside above the upper post: the filled half points away from zero.
    expect(markerPaths('outside-unsure', 10, 10, 6, 1).half).toBe('M10 2.7L17.3 10L10 17.3Z');
  });
});

describe('hatching', () => {
  it('stays inside its rectangle', () => {
    const size = fc.double({ min: 1, max: 300, noNaN: true });
    fc.assert(
      fc.property(size, size, fc.constantFrom('rising', 'falling'), (x1, height, lean) => {
        const path = hatchPath(0, x1, 7, 7 + height, 6, lean as 'rising' | 'falling');
        const numbers = path.match(/-?[\d.]+/g)?.map(Number) ?? [];
        numbers.forEach((value, i) => {
          const [low, high] = i % 2 === 0 ? [0, x1] : [7, 7 + height];
          // Coordinates are written to a tenth of a pixel.
          expect(value).toBeGreaterThanOrEqual(low - 0.051);
          expect(value).toBeLessThanOrEqual(high + 0.051);
        });
      }),
    );
  });

  it('fills the whole channel when the method cannot decide', () => {
    const strip = stripGeometry({ tolerance: 2, guardBand: 5, error: 0.41, expandedUncertainty: 2 }, 'page');
    expect(strip.result?.outcome).toBe('within-unsure');
    expect(strip.words).toContain('cannot decide');
  });
});
