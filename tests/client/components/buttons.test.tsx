import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { Bell, Phone } from 'lucide-react';
import { MemoryRouter } from 'react-router-dom';
import { expect, test, vi } from 'vitest';
import { Button } from '#src/components/Button.tsx';
import { IconButton } from '#src/components/IconButton.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';

test('a button does not send a form unless it says so', async () => {
  const onSubmit = vi.fn((event: React.FormEvent) => event.preventDefault());
  render(
    <form onSubmit={onSubmit}>
      <Button>Look</Button>
      <Button type="submit">Send</Button>
    </form>,
  );
  await userEvent.click(screen.getByRole('button', { name: 'Look' }));
  expect(onSubmit).not.toHaveBeenCalled();
  await userEvent.click(screen.getByRole('button', { name: 'Send' }));
  expect(onSubmit).toHaveBeenCalledTimes(1);
});

test('a busy button keeps its name and the focus, says that it is busy, and does nothing', async () => {
  const onClick = vi.fn();
  const { rerender } = render(<Button onClick={onClick}>Send</Button>);
  const button = screen.getByRole('button', { name: 'Send' });
  button.focus();
  rerender(
    <Button onClick={onClick} busy>
      Send
    </Button>,
  );
  expect(screen.getByRole('button', { name: 'Send' })).toBe(button);
  expect(button.getAttribute('aria-busy')).toBe('true');
  expect(button.getAttribute('aria-disabled')).toBe('true');
  expect(document.activeElement).toBe(button);
  await userEvent.click(button);
  expect(onClick).not.toHaveBeenCalled();
});

test('a busy submit button does not send its form a second time, by press or by Enter', async () => {
  const onSubmit = vi.fn((event: React.FormEvent) => event.preventDefault());
  render(
    <form onSubmit={onSubmit}>
      <input aria-label="Name" />
      <Button type="submit" busy>
        Send
      </Button>
    </form>,
  );
  await userEvent.click(screen.getByRole('button', { name: 'Send' }));
  await userEvent.type(screen.getByRole('textbox', { name: 'Name' }), 'Ines{Enter}');
  expect(onSubmit).not.toHaveBeenCalled();
});

test('a disabled button does nothing', async () => {
  const onClick = vi.fn();
  render(
    <Button disabled onClick={onClick}>
      None of these
    </Button>,
  );
  await userEvent.click(screen.getByRole('button', { name: 'None of these' }));
  expect(onClick).not.toHaveBeenCalled();
});

test('the picture of a button adds nothing to its name', () => {
  render(<Button icon={Phone}>Call</Button>);
  expect(screen.getByRole('button', { name: 'Call' }).querySelector('svg')?.getAttribute('aria-hidden')).toBe(
    'true',
  );
});

test('a button with a picture only is named by its label', () => {
  render(<IconButton icon={Bell} label="Notifications" />);
  expect(screen.getByRole('button', { name: 'Notifications' })).toBeTruthy();
});

test('what looks like a button and goes somewhere is a link', () => {
  render(
    <MemoryRouter>
      <LinkButton to="/check-in">Start</LinkButton>
      <LinkButton href="tel:555-0142">Call the clinic</LinkButton>
    </MemoryRouter>,
  );
  expect(screen.getByRole('link', { name: 'Start' }).getAttribute('href')).toBe('/check-in');
  expect(screen.getByRole('link', { name: 'Call the clinic' }).getAttribute('href')).toBe('tel:555-0142');
});
