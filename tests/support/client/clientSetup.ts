import { afterEach, beforeEach, vi } from 'vitest';

/** What Vuetify asks of a browser and happy-dom does not have. */
class QuietResizeObserver implements ResizeObserver {
  observe(): void {}
  unobserve(): void {}
  disconnect(): void {}
}

vi.stubGlobal('ResizeObserver', QuietResizeObserver);
vi.stubGlobal('visualViewport', new EventTarget());

beforeEach(() => {
  localStorage.clear();
  // A test that asks the server says what it answers.
  vi.spyOn(globalThis, 'fetch').mockRejectedValue(new TypeError('No answer was prepared for this request.'));
});

afterEach(() => {
  vi.restoreAllMocks();
  document.body.innerHTML = '';
});
