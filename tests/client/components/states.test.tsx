import { act, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, expect, test, vi } from 'vitest';
import { Banner } from '#src/components/Banner.tsx';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { ProgressSteps } from '#src/components/ProgressSteps.tsx';

afterEach(() => {
  vi.useRealTimers();
});

test('loading says nothing for 300 ms and then says what is being fetched', () => {
  vi.useFakeTimers();
  render(<LoadingState label="Fetching the round" />);
  const region = screen.getByRole('status');
  act(() => void vi.advanceTimersByTime(299));
  expect(region.textContent).toBe('');
  act(() => void vi.advanceTimersByTime(1));
  expect(region.textContent).toBe('Fetching the round');
});

test('a failure interrupts, says what to do, offers another try and gives a number to read out', async () => {
  const onRetry = vi.fn();
  render(
    <ErrorState
      title="The round could not be fetched"
      retry={{ label: 'Try again', onRetry }}
      reference={{ label: 'Reference', id: 'a1b2' }}
    >
      Check the connection.
    </ErrorState>,
  );
  const alert = screen.getByRole('alert');
  expect(alert.textContent).toContain('The round could not be fetched');
  expect(alert.textContent).toContain('Check the connection.');
  expect(alert.textContent).toContain('Reference a1b2');
  await userEvent.click(screen.getByRole('button', { name: 'Try again' }));
  expect(onRetry).toHaveBeenCalledTimes(1);
});

test('an empty place says so in words and offers the way on', () => {
  render(
    <EmptyState title="Nothing to see" action={<a href="/quiet">See the quiet ones</a>}>
      New flags appear by themselves.
    </EmptyState>,
  );
  expect(screen.getByText('Nothing to see')).toBeTruthy();
  expect(screen.getByText('New flags appear by themselves.')).toBeTruthy();
  expect(screen.getByRole('link', { name: 'See the quiet ones' })).toBeTruthy();
});

test('a banner is announced only where it is asked to be', () => {
  const { rerender } = render(<Banner title="Closed">Opens at 08:00.</Banner>);
  expect(screen.queryByRole('status')).toBeNull();
  rerender(
    <Banner title="Closed" announce="status">
      Opens at 08:00.
    </Banner>,
  );
  expect(screen.getByRole('status').textContent).toBe('ClosedOpens at 08:00.');
  rerender(
    <Banner tone="danger" announce="alert">
      Call now.
    </Banner>,
  );
  expect(screen.getByRole('alert').textContent).toBe('Call now.');
});

test('progress is told in words and in numbers', () => {
  render(<ProgressSteps total={8} current={5} label="Step 5 of 8" remaining="about 25 s left" />);
  const bar = screen.getByRole('progressbar', { name: 'Step 5 of 8' });
  expect(bar.getAttribute('aria-valuenow')).toBe('5');
  expect(bar.getAttribute('aria-valuemax')).toBe('8');
  expect(screen.getByText('about 25 s left')).toBeTruthy();
});
