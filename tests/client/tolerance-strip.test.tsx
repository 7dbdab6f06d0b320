import { cleanup, render, screen } from '@testing-library/react';
import { afterEach, expect, it } from 'vitest';
import { ToleranceStrip } from '../../client/src/components/strip/tolerance-strip.tsx';
import { OutcomeMark, TrustMark } from '../../client/src/components/ui/marks.tsx';

afterEach(cleanup);

const base = { tolerance: 3, guardBand: 0.85, expandedUncertainty: 0.85, what: 'As left' };
const spoken = () => screen.getByRole('img').getAttribute('aria-label')?.replaceAll('\u00a0', ' ');

it('speaks outcome, error, U with k, tolerance, guard band, earlier results and forecast', () => {
  render(<ToleranceStrip {...base} error={1.23} earlier={[0.6, 0.1, -0.5]} forecast={1.7} />);
  expect(spoken()).toBe(
    'Within, clear. As left error +1.23 %, U 0.85 % (k = 2), tolerance ±3 %, guard band 0.85 %. ' +
      'Before that +0.6, +0.1, −0.5 %. Forecast today +1.7 %.',
  );
});

it('speaks the outcome that the server decided, not one of its own', () => {
  render(<ToleranceStrip {...base} error={2.9} outcome="within-clear" guardBand={0} />);
  expect(spoken()).toContain('Within, clear.');
});

it('says so before the first result', () => {
  render(<ToleranceStrip {...base} size="page" />);
  expect(spoken()).toBe('No result yet. Tolerance ±3 %.');
  expect(screen.getByText('no result yet')).toBeTruthy();
});

it('keeps a closed result out of the document altogether', () => {
  const { container } = render(
    <ToleranceStrip
      {...base}
      size="bench"
      error={-1.1}
      forecast={-1.3}
      earlier={[-0.7]}
      closed="error shown after replicate 5"
    />,
  );
  expect(screen.getByText('error shown after replicate 5')).toBeTruthy();
  expect(container.innerHTML).not.toMatch(/1\.1|1\.3|0\.7/);
});

it('prints the figure with its U on page and bench, none in a row', () => {
  const figure = '−1.70\u00a0±\u00a00.85\u00a0%';
  const { rerender, container } = render(<ToleranceStrip {...base} size="page" error={-1.7} />);
  expect(container.querySelector('text')?.textContent).toBe(figure);
  rerender(<ToleranceStrip {...base} size="row" error={-1.7} />);
  expect(container.querySelector('text')).toBeNull();
});

it('carries absolute errors in their own unit', () => {
  render(
    <ToleranceStrip
      tolerance={0.5}
      guardBand={0.1}
      error={0.12}
      expandedUncertainty={0.1}
      unit="°C"
      what="Check"
    />,
  );
  expect(spoken()).toContain('Check error +0.12 °C, U 0.10 °C (k = 2), tolerance ±0.5 °C');
});

it('says trust and outcome in words beside their shapes', () => {
  render(
    <>
      <TrustMark trust="do-not-use" reason="cell constant changed, no record" />
      <OutcomeMark outcome="outside-unsure" />
    </>,
  );
  expect(screen.getByText('do not use').className).toContain('trust-stop');
  expect(screen.getByText('cell constant changed, no record')).toBeTruthy();
  expect(screen.getByText('outside, too close to be sure')).toBeTruthy();
});

it('is not loud about a reading that somebody holds', () => {
  render(<TrustMark trust="do-not-use" isHeld reason="held by Ines Falk" />);
  expect(screen.getByText('do not use').className).not.toContain('trust-stop');
});
