import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { createRef } from 'react';
import { describe, expect, test } from 'vitest';
import { PasswordField } from '#src/components/PasswordField.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { TextField } from '#src/components/TextField.tsx';

/** The text that a screen reader reads after the name, in its order. */
function descriptionOf(field: HTMLElement): string {
  const ids = field.getAttribute('aria-describedby')?.split(' ') ?? [];
  return ids.map((id) => document.getElementById(id)?.textContent ?? `missing ${id}`).join(' | ');
}

const fields = [
  { name: 'TextField', Component: TextField },
  { name: 'TextArea', Component: TextArea },
  {
    name: 'PasswordField',
    Component: (props: { label: string; hint?: string; error?: string }) => (
      <PasswordField {...props} revealLabel="Show the password" />
    ),
  },
];

describe.each(fields)('$name', ({ Component }) => {
  test('is named by its label and has no description of nothing', () => {
    render(<Component label="E-mail" />);
    const field = screen.getByLabelText('E-mail');
    expect(field.hasAttribute('aria-describedby')).toBe(false);
    expect(field.hasAttribute('aria-invalid')).toBe(false);
  });

  test('is described by its error first and then by its hint', () => {
    render(<Component label="E-mail" hint="The one the clinic knows" error="Write an e-mail address." />);
    const field = screen.getByLabelText('E-mail');
    expect(field.getAttribute('aria-invalid')).toBe('true');
    expect(descriptionOf(field)).toMatch(/Write an e-mail address\. \| The one the clinic knows$/u);
  });

  test('two on one page do not share ids', () => {
    render(
      <>
        <Component label="First" error="One" />
        <Component label="Second" error="Two" />
      </>,
    );
    expect(descriptionOf(screen.getByLabelText('First'))).toContain('One');
    expect(descriptionOf(screen.getByLabelText('Second'))).toContain('Two');
  });
});

test('a field hands its ref on, so that a form can move the focus to the first error', () => {
  const ref = createRef<HTMLInputElement>();
  render(<TextField label="E-mail" ref={ref} />);
  ref.current!.focus();
  expect(document.activeElement).toBe(screen.getByLabelText('E-mail'));
});

test('a password is hidden until it is asked for, and keeps what was typed', async () => {
  render(<PasswordField label="Password" revealLabel="Show the password" />);
  const field = screen.getByLabelText<HTMLInputElement>('Password');
  const reveal = screen.getByRole('button', { name: 'Show the password' });
  await userEvent.type(field, 'orchard lane');
  expect(field.type).toBe('password');
  expect(reveal.getAttribute('aria-pressed')).toBe('false');
  await userEvent.click(reveal);
  expect(field.type).toBe('text');
  expect(reveal.getAttribute('aria-pressed')).toBe('true');
  expect(field.value).toBe('orchard lane');
});
