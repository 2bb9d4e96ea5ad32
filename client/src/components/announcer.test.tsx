import { act, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { Announcer, useAnnounce } from './announcer.tsx';

beforeEach(() => vi.useFakeTimers());
afterEach(() => vi.useRealTimers());

function Board() {
  const announce = useAnnounce();
  let count = 0;
  return (
    <button
      type="button"
      onClick={() => {
        count += 1;
        announce(`${count} bids`);
      }}
    >
      bid
    </button>
  );
}

it('says at most one sentence in five seconds, the newest, however many bids come (E-08)', () => {
  render(
    <Announcer>
      <Board />
    </Announcer>,
  );
  const region = screen.getByTestId('polite');
  expect(region).toHaveAttribute('aria-live', 'polite');
  const said: string[] = [];
  for (let second = 0; second < 60; second += 1) {
    fireEvent.click(screen.getByRole('button'));
    act(() => void vi.advanceTimersByTime(1000));
    if (region.textContent !== '' && region.textContent !== said.at(-1)) said.push(region.textContent ?? '');
  }
  expect(said.length).toBeGreaterThan(8);
  expect(said.length).toBeLessThanOrEqual(13);
  expect(said.at(-1)).not.toBe('1 bids');
});
