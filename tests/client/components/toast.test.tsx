import { act, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { ToastProvider, useToast } from '#src/components/Toast.tsx';
import type { ToastMessage } from '#src/components/Toast.tsx';

beforeEach(() => {
  vi.useFakeTimers();
});

afterEach(() => {
  vi.useRealTimers();
});

function ShowButton({ message }: { message: ToastMessage }) {
  const show = useToast();
  return (
    <button type="button" onClick={() => show(message)}>
      Show
    </button>
  );
}

function renderToast(message: ToastMessage) {
  render(
    <ToastProvider label="Messages" closeLabel="Close">
      <ShowButton message={message} />
    </ToastProvider>,
  );
  const region = screen.getByRole('status');
  expect(region.textContent).toBe('');
  fireEvent.click(screen.getByRole('button', { name: 'Show' }));
  return region;
}

const pass = (ms: number) => act(() => void vi.advanceTimersByTime(ms));

test('a message appears in a polite region that was there before it, and goes after 8 s', () => {
  const region = renderToast({ text: 'Kept.' });
  expect(screen.getByRole('status')).toBe(region);
  expect(region.textContent).toContain('Kept.');
  pass(7_999);
  expect(region.textContent).toContain('Kept.');
  pass(1);
  expect(region.textContent).toBe('');
});

test('no message goes sooner than 8 s, even where it is asked to', () => {
  const region = renderToast({ text: 'Kept.', shownMs: 500 });
  pass(7_999);
  expect(region.textContent).toContain('Kept.');
});

test('a message without a time stays until it is closed', () => {
  const region = renderToast({ text: 'Not sent yet.', shownMs: null });
  pass(600_000);
  expect(region.textContent).toContain('Not sent yet.');
  fireEvent.click(screen.getByRole('button', { name: 'Close' }));
  expect(region.textContent).toBe('');
});

test('a message waits while the focus or a pointer is on it', () => {
  const region = renderToast({ text: 'Kept.' });
  fireEvent.focus(screen.getByRole('button', { name: 'Close' }));
  pass(60_000);
  expect(region.textContent).toContain('Kept.');
  fireEvent.blur(screen.getByRole('button', { name: 'Close' }));
  pass(8_000);
  expect(region.textContent).toBe('');
});

test('the action of a message runs once and closes it', () => {
  const onAction = vi.fn();
  const region = renderToast({ text: 'Removed.', action: { label: 'Undo', onAction } });
  fireEvent.click(screen.getByRole('button', { name: 'Undo' }));
  expect(onAction).toHaveBeenCalledTimes(1);
  expect(region.textContent).toBe('');
});
