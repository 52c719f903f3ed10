import { cleanup } from '@testing-library/react';
import type { MockInstance } from 'vitest';
import { afterEach, beforeEach, expect, vi } from 'vitest';

let errors: MockInstance<typeof console.error>;

beforeEach(() => {
  errors = vi.spyOn(console, 'error');
});

/** React reports broken markup, missing keys and unwrapped updates by console.error: each fails its test. */
afterEach(() => {
  cleanup();
  const unexpected = errors.mock.calls;
  vi.restoreAllMocks();
  expect(unexpected, 'unexpected console errors').toEqual([]);
});
