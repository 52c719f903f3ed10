import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { expect, test, vi } from 'vitest';
import { CheckTile } from '#src/components/CheckTile.tsx';
import { Checkbox } from '#src/components/Checkbox.tsx';
import { ChoiceTile } from '#src/components/ChoiceTile.tsx';
import { NumberGrid } from '#src/components/NumberGrid.tsx';
import { RadioTiles } from '#src/components/RadioTiles.tsx';

test('a number grid offers each number from lowest to highest, in that order, with none picked', () => {
  render(<NumberGrid label="Pain now" value={null} onPick={vi.fn()} />);
  const group = screen.getByRole('group', { name: 'Pain now' });
  const buttons = within(group).getAllByRole('button');
  expect(buttons.map((button) => button.textContent)).toEqual([
    '0',
    '1',
    '2',
    '3',
    '4',
    '5',
    '6',
    '7',
    '8',
    '9',
    '10',
  ]);
  expect(within(group).queryAllByRole('button', { pressed: true })).toEqual([]);
});

test.each(['left', 'right'] as const)('numbers keep their order towards the %s hand', (towards) => {
  render(<NumberGrid label="Pain now" value={null} onPick={vi.fn()} towards={towards} min={1} max={3} />);
  expect(screen.getAllByRole('button').map((button) => button.textContent)).toEqual(['1', '2', '3']);
});

test('a press on a number picks it, and the picked one says so', async () => {
  const onPick = vi.fn();
  const { rerender } = render(<NumberGrid label="Pain now" value={null} onPick={onPick} />);
  await userEvent.click(screen.getByRole('button', { name: '7' }));
  expect(onPick).toHaveBeenCalledExactlyOnceWith(7);
  rerender(<NumberGrid label="Pain now" value={7} onPick={onPick} />);
  expect(screen.getByRole('button', { pressed: true }).textContent).toBe('7');
});

test('the ends of a scale are told in words to those who hear them', () => {
  render(
    <NumberGrid
      label="Pain now"
      value={null}
      onPick={vi.fn()}
      anchors={{ lowest: 'no pain', highest: 'worst pain' }}
    />,
  );
  expect(screen.getByRole('button', { name: '0, no pain' })).toBeTruthy();
  expect(screen.getByRole('button', { name: '10, worst pain' })).toBeTruthy();
  expect(screen.getByRole('button', { name: '5' })).toBeTruthy();
});

test('a choice tile says whether it is picked', () => {
  render(
    <>
      <ChoiceTile label="The same" picked />
      <ChoiceTile label="More" picked={false} />
    </>,
  );
  expect(screen.getByRole('button', { name: 'The same' }).getAttribute('aria-pressed')).toBe('true');
  expect(screen.getByRole('button', { name: 'More' }).getAttribute('aria-pressed')).toBe('false');
});

test('a check tile is named by its label and described by its examples', () => {
  render(<CheckTile label="Shoulder or arm" detail="A pop, a fall, a knock" />);
  const box = screen.getByRole('checkbox', { name: 'Shoulder or arm' });
  const detail = document.getElementById(box.getAttribute('aria-describedby') ?? '');
  expect(detail?.textContent).toBe('A pop, a fall, a knock');
});

test('a list of check tiles closes its "none" button once one is ticked, and opens it again', async () => {
  function List() {
    const [ticked, setTicked] = useState<string[]>([]);
    const toggle = (tile: string) =>
      setTicked(ticked.includes(tile) ? ticked.filter((one) => one !== tile) : [...ticked, tile]);
    return (
      <>
        {['One', 'Two'].map((tile) => (
          <CheckTile key={tile} label={tile} checked={ticked.includes(tile)} onChange={() => toggle(tile)} />
        ))}
        <button type="button" disabled={ticked.length > 0}>
          None of these
        </button>
      </>
    );
  }
  render(<List />);
  const none = screen.getByRole<HTMLButtonElement>('button', { name: 'None of these' });
  expect(none.disabled).toBe(false);
  await userEvent.click(screen.getByText('Two'));
  expect(none.disabled).toBe(true);
  await userEvent.click(screen.getByText('Two'));
  expect(none.disabled).toBe(false);
});

test('a disabled tile cannot be ticked', async () => {
  const onChange = vi.fn();
  render(<CheckTile label="One" disabled onChange={onChange} />);
  await userEvent.click(screen.getByText('One'));
  expect(onChange).not.toHaveBeenCalled();
});

test('the words of a checkbox belong to its target, and the keyboard ticks it', async () => {
  render(<Checkbox label="Keep me signed in" />);
  const box = screen.getByRole<HTMLInputElement>('checkbox', { name: 'Keep me signed in' });
  await userEvent.click(screen.getByText('Keep me signed in'));
  expect(box.checked).toBe(true);
  box.focus();
  await userEvent.keyboard(' ');
  expect(box.checked).toBe(false);
});

test('radio tiles start with nothing picked and tell their error with their name', async () => {
  const onChange = vi.fn();
  render(
    <RadioTiles
      legend="Outcome"
      options={[
        { value: 'phone', label: 'Advised by phone' },
        { value: 'visit', label: 'Visit brought forward', detail: 'The desk is told' },
      ]}
      value={null}
      onChange={onChange}
      error="Choose what came of it."
    />,
  );
  const group = screen.getByRole('group', { name: 'Outcome' });
  expect(document.getElementById(group.getAttribute('aria-describedby') ?? '')?.textContent).toBe(
    'Choose what came of it.',
  );
  expect(screen.queryAllByRole('radio', { checked: true })).toEqual([]);
  await userEvent.click(screen.getByText('Visit brought forward'));
  expect(onChange).toHaveBeenCalledExactlyOnceWith('visit');
});
