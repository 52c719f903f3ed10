import { render, screen, within } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { Avatar } from '#src/components/Avatar.tsx';
import { DefinitionTable } from '#src/components/DefinitionTable.tsx';
import { Sparkline } from '#src/components/Sparkline.tsx';

describe('a sparkline', () => {
  test('says in words what it draws', () => {
    render(<Sparkline values={[4, 4, 5]} label="Pain now, 3 days: 4, 4, 5" />);
    expect(screen.getByRole('img', { name: 'Pain now, 3 days: 4, 4, 5' })).toBeTruthy();
  });

  test('breaks its line at a gap and marks the gap', () => {
    const { container } = render(<Sparkline values={[4, 4, null, 5, 5]} label="Pain now" />);
    const lines = [...container.querySelectorAll('polyline')];
    expect(lines.map((line) => line.getAttribute('points')?.split(' ').length)).toEqual([2, 2]);
    // One ring for the gap and one dot for the last value.
    expect(container.querySelectorAll('circle')).toHaveLength(2);
  });

  test('has no last point where the last value is a gap', () => {
    const { container } = render(<Sparkline values={[4, null]} tone="clay" label="Pain now" />);
    expect(container.querySelectorAll('.fill-clay')).toHaveLength(0);
  });

  test('draws nothing but its ground where there are no values', () => {
    const { container } = render(<Sparkline values={[]} label="No check-ins yet" />);
    expect(container.querySelectorAll('polyline, circle')).toHaveLength(0);
    expect(container.innerHTML).not.toContain('NaN');
  });

  test('keeps the extremes inside its box', () => {
    const { container } = render(<Sparkline values={[0, 10]} reference={10} label="Pain now" />);
    const heights = [...container.querySelectorAll('circle')].map((circle) =>
      Number(circle.getAttribute('cy')),
    );
    expect(Math.min(...heights)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...heights)).toBeLessThanOrEqual(32);
  });
});

test.each([
  ['Ines Valcourt', 'IV'],
  ['Dr. Anneke van der Mbeki-Stone', 'DM'],
  ['Petra', 'P'],
  ['élodie ōta', 'ÉŌ'],
  ['  ', ''],
])('the avatar of "%s" shows "%s"', (name, initials) => {
  const { container } = render(<Avatar name={name} decorative />);
  expect(container.textContent).toBe(initials);
});

test('an avatar that stands alone says the whole name', () => {
  render(<Avatar name="Ines Valcourt" />);
  expect(screen.getByRole('img', { name: 'Ines Valcourt' })).toBeTruthy();
});

test('a definition table is a table with a name, a heading a column and a heading a row', () => {
  render(
    <DefinitionTable
      caption="Today beside her usual"
      columns={['Today', 'Her usual']}
      rows={[
        { key: 'pain', label: 'Pain now', cells: ['5', '4'] },
        { key: 'sling', label: 'Sling', cells: ['As advised', 'As advised'] },
      ]}
    />,
  );
  const table = screen.getByRole('table', { name: 'Today beside her usual' });
  expect(
    within(table)
      .getAllByRole('columnheader')
      .map((cell) => cell.textContent),
  ).toEqual(['Today', 'Her usual']);
  expect(
    within(table)
      .getAllByRole('rowheader')
      .map((cell) => cell.textContent),
  ).toEqual(['Pain now', 'Sling']);
});
