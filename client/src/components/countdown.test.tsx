import { act, screen } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { renderInApp } from '../test/render.tsx';
import { DueTime } from './countdown.tsx';

beforeEach(() => vi.useFakeTimers({ now: new Date('2026-12-01T18:00:00.000Z') }));
afterEach(() => vi.useRealTimers());

it('shows the moment with its zone, counts down, and says once that it passed', () => {
  const passed = vi.fn();
  renderInApp(<DueTime at="2026-12-01T19:00:00.000Z" timeZone="America/New_York" onPassed={passed} />);
  expect(screen.getByText('Tue, Dec 1, 2:00 PM EST')).toBeInTheDocument();
  expect(screen.getByText('in 1 h 0 min')).toBeInTheDocument();
  act(() => void vi.advanceTimersByTime(50 * 60_000));
  expect(screen.getByText(/^in 10 min 0\d s$/)).toBeInTheDocument();
  act(() => void vi.advanceTimersByTime(9 * 60_000 + 30_000));
  expect(screen.getByText(/^in 0 min (29|30|31) s$/)).toBeInTheDocument();
  expect(passed).not.toHaveBeenCalled();
  act(() => void vi.advanceTimersByTime(10 * 60_000));
  expect(screen.getByText('passed')).toBeInTheDocument();
  expect(passed).toHaveBeenCalledTimes(1);
});
