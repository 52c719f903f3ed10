import { render } from '@testing-library/react';
import { expect, test } from 'vitest';
import { urgencies } from '#shared/red-flags/findings.ts';
import { UrgencySign } from '#src/features/triage/UrgencySign.tsx';

test('each urgency has an outline of its own, so that colour is never needed to tell them apart', () => {
  const outlines = urgencies.map((urgency) => {
    const { container, unmount } = render(<UrgencySign urgency={urgency} />);
    const shapes = [...container.querySelectorAll('path, circle')].map(
      (shape) => `${shape.tagName} ${shape.getAttribute('d') ?? shape.getAttribute('r')}`,
    );
    unmount();
    return shapes.join(' ');
  });
  expect(new Set(outlines).size).toBe(urgencies.length);
});

test.each([
  ['emergency', 'Emergency'],
  ['urgent', 'Urgent'],
  ['same-day', 'Same day'],
  ['routine', 'Routine'],
] as const)('%s always has its word, shown or not', (urgency, word) => {
  const shown = render(<UrgencySign urgency={urgency} />);
  expect(shown.container.textContent).toBe(word);
  shown.unmount();
  const hidden = render(<UrgencySign urgency={urgency} word="hidden" />);
  expect(hidden.container.textContent).toBe(word);
});
