// @vitest-environment happy-dom
import { cleanup, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, expect, test } from 'vitest';
import { ThemeSwitch } from '#src/components/ui/theme-switch.tsx';

afterEach(cleanup);

test('a chosen look holds on the page, in every switch and in the browser', async () => {
  render(
    <>
      <ThemeSwitch />
      <ThemeSwitch />
    </>,
  );
  const [firstDark, secondDark] = screen.getAllByRole('radio', { name: 'Dark' });
  if (firstDark === undefined) {
    throw new Error('The switch has no choice named Dark.');
  }
  await userEvent.click(firstDark);
  expect(document.documentElement.dataset['theme']).toBe('dark');
  expect(secondDark).toHaveProperty('checked', true);
  expect(window.localStorage.getItem('millpond.theme')).toBe('dark');
  await userEvent.click(screen.getAllByRole('radio', { name: 'Light' })[1] ?? firstDark);
  expect(document.documentElement.dataset['theme']).toBe('light');
  expect(firstDark).toHaveProperty('checked', false);
});
