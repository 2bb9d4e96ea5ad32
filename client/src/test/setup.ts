import '@testing-library/jest-dom/vitest';
import { cleanup } from '@testing-library/react';
import { afterEach, beforeAll } from 'vitest';
import { startWords } from '../lib/i18n.ts';

// What the components touch and the test document lacks.
class NoResizeObserver implements ResizeObserver {
  observe() {
    // Nothing has a size here.
  }
  unobserve() {
    // See above.
  }
  disconnect() {
    // See above.
  }
}
globalThis.ResizeObserver ??= NoResizeObserver;
Element.prototype.scrollIntoView ??= () => undefined;
Element.prototype.hasPointerCapture ??= () => false;
Element.prototype.releasePointerCapture ??= () => undefined;

beforeAll(() => startWords('en'));
afterEach(cleanup);
