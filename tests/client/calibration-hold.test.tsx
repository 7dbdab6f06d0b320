import { act, cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { HoldButton } from '../../client/src/features/calibrations/bench/hold-button.tsx';

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  cleanup();
  vi.useRealTimers();
});

function aButton(isEnabled = true) {
  const captured: number[] = [];
  const view = render(
    <HoldButton
      isEnabled={isEnabled}
      waiting="Wait until stable"
      what="replicate 4"
      onHeld={() => captured.push(Date.now())}
    />,
  );
  const button = screen.getByRole('button');
  button.setPointerCapture = () => undefined;
  return { captured, button, view };
}
const pass = (ms: number): void =>
  act(() => {
    vi.advanceTimersByTime(ms);
  });

describe('press and hold', () => {
  it('captures after 600 ms, and says meanwhile what it does', () => {
    const { captured, button } = aButton();
    fireEvent.pointerDown(button, { button: 0, pointerId: 1 });
    pass(599);
    expect(button.textContent).toBe('Keep holdingcapturing replicate 4');
    expect(captured).toHaveLength(0);
    pass(1);
    expect(captured).toHaveLength(1);
  });

  it('does nothing when let go early, as by a drop of water', () => {
    const { captured, button } = aButton();
    fireEvent.pointerDown(button, { button: 0, pointerId: 1 });
    pass(400);
    fireEvent.pointerUp(button, { pointerId: 1 });
    pass(2000);
    expect(captured).toHaveLength(0);
  });

  it.each([' ', 'Enter'])('works with the key %j held, which repeats', (key) => {
    const { captured, button } = aButton();
    fireEvent.keyDown(button, { key });
    for (let i = 0; i < 5; i += 1) fireEvent.keyDown(button, { key, repeat: true });
    pass(600);
    pass(2000);
    expect(captured).toHaveLength(1);
  });

  it('lets a screen reader activate it, which cannot hold', () => {
    const { captured, button } = aButton();
    fireEvent.click(button, { detail: 0 });
    expect(captured).toHaveLength(1);
  });

  it('ignores an ordinary click', () => {
    const { captured, button } = aButton();
    fireEvent.click(button, { detail: 1 });
    expect(captured).toHaveLength(0);
  });

  it('waits until readings are stable, and says so', () => {
    const { captured, button } = aButton(false);
    fireEvent.pointerDown(button, { button: 0, pointerId: 1 });
    fireEvent.click(button, { detail: 0 });
    pass(2000);
    expect(captured).toHaveLength(0);
    expect(button.textContent).toBe('Wait until stablethen press and hold');
    expect(button.getAttribute('aria-disabled')).toBe('true');
  });
});
