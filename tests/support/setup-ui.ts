import { cleanup, configure } from '@testing-library/react';
import { afterEach } from 'vitest';

// Set by some runners; Reanimated would take its Jest path.
delete process.env.JEST_WORKER_ID;

// Reanimated asks for reduced motion while it is imported; jsdom has no matchMedia.
window.matchMedia ??= (query: string): MediaQueryList => ({
  matches: false,
  media: query,
  onchange: null,
  addEventListener() {},
  removeEventListener() {},
  addListener() {},
  removeListener() {},
  dispatchEvent: () => false,
});

// jsdom counts a frame's time from another zero than performance.now, and Reanimated compares the two.
window.requestAnimationFrame = (callback) => Number(setTimeout(() => callback(performance.now()), 16));
window.cancelAnimationFrame = (id) => clearTimeout(id);

// The usual second is short on a machine that runs other work beside the tests; nothing here is about speed.
configure({ asyncUtilTimeout: 10_000 });

afterEach(() => cleanup());
