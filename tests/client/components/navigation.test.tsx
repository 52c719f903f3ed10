import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { ListChecks, MessageSquare, Sprout } from 'lucide-react';
import { MemoryRouter } from 'react-router-dom';
import { expect, test } from 'vitest';
import { BottomBar } from '#src/components/BottomBar.tsx';
import { EmergencyLine } from '#src/components/EmergencyLine.tsx';
import { Mark } from '#src/components/Mark.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { Rail } from '#src/components/Rail.tsx';
import { SkipLink } from '#src/components/SkipLink.tsx';

const items = [
  { to: '/', label: 'Today', icon: Sprout, end: true },
  { to: '/plan', label: 'My plan', icon: ListChecks },
  {
    to: '/messages',
    label: 'Messages',
    icon: MessageSquare,
    badge: { count: 120, label: '120 new messages' },
  },
];

test('the bottom bar names its places and marks only the one that is open', () => {
  render(
    <MemoryRouter initialEntries={['/plan/exercises']}>
      <BottomBar label="Main" items={items} />
    </MemoryRouter>,
  );
  const links = within(screen.getByRole('navigation', { name: 'Main' })).getAllByRole('link');
  expect(links.map((link) => link.getAttribute('aria-current'))).toEqual([null, 'page', null]);
});

test('a count is said in words and shown short', () => {
  render(
    <MemoryRouter>
      <BottomBar label="Main" items={items} />
    </MemoryRouter>,
  );
  const link = screen.getByRole('link', { name: /120 new messages.*Messages/u });
  expect(within(link).getByText('99+').getAttribute('aria-hidden')).toBe('true');
});

test('a count of nothing is not shown', () => {
  render(
    <MemoryRouter>
      <BottomBar
        label="Main"
        items={[{ to: '/', label: 'Today', icon: Sprout, badge: { count: 0, label: '0 new' } }]}
      />
    </MemoryRouter>,
  );
  expect(screen.getByRole('link', { name: 'Today' }).textContent).toBe('Today');
});

test('the folded rail opens under its button and folds again once a place is chosen', async () => {
  render(
    <MemoryRouter>
      <Rail label="Main" menuLabel="Menu" items={items} head={<Mark />} foot="On call now" />
    </MemoryRouter>,
  );
  const button = screen.getByRole('button', { name: 'Menu' });
  expect(button.getAttribute('aria-expanded')).toBe('false');
  await userEvent.click(button);
  expect(button.getAttribute('aria-expanded')).toBe('true');
  await userEvent.click(screen.getByRole('link', { name: 'My plan' }));
  expect(button.getAttribute('aria-expanded')).toBe('false');
  expect(screen.getByRole('link', { name: 'My plan' }).getAttribute('aria-current')).toBe('page');
});

test('the whole emergency line is a call link in a landmark of its own', () => {
  render(
    <EmergencyLine label="Emergency" href="tel:911">
      Not for emergencies. Call 911 if you need help now.
    </EmergencyLine>,
  );
  const landmark = screen.getByRole('complementary', { name: 'Emergency' });
  const link = within(landmark).getByRole('link', {
    name: 'Not for emergencies. Call 911 if you need help now.',
  });
  expect(link.getAttribute('href')).toBe('tel:911');
});

test('the skip link comes first and leads to the content', async () => {
  render(
    <>
      <SkipLink targetId="content" label="Skip to the content" />
      <PageHeader title="Caseload" detail="50 patients" />
    </>,
  );
  await userEvent.tab();
  expect(document.activeElement).toBe(screen.getByRole('link', { name: 'Skip to the content' }));
  expect(document.activeElement?.getAttribute('href')).toBe('#content');
});

test('the heading of a page can take the focus from a script but not from the keyboard', async () => {
  render(<PageHeader title="Caseload" />);
  const heading = screen.getByRole('heading', { level: 1, name: 'Caseload' });
  await userEvent.tab();
  expect(document.activeElement).toBe(document.body);
  heading.focus();
  expect(document.activeElement).toBe(heading);
});
