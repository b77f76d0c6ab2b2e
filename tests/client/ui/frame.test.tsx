// @vitest-environment happy-dom
import { cleanup, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, describe, expect, test, vi } from 'vitest';
import { PhaseBar } from '#src/components/drawing/phase-bar.tsx';
import { AppShell } from '#src/components/layout/app-shell.tsx';
import { Page, Section } from '#src/components/layout/page.tsx';
import { Waterline } from '#src/components/layout/waterline.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { GalleryPage } from '#src/features/gallery/components/gallery-page.tsx';
import { SignInPage } from '#src/features/session/components/sign-in-page.tsx';

afterEach(cleanup);

function renderShell(onSignOut = vi.fn()) {
  render(
    <MemoryRouter>
      <AppShell
        homeHref="/larkfen"
        nav={[
          { word: 'Today', to: '/larkfen', isCurrent: false },
          { word: 'Board', to: '/larkfen/board', isCurrent: true },
        ]}
        siteSwitch="Larkfen"
        siteName="Larkfen"
        siteClock="Tue 16 Jun 10:42"
        person={{ name: 'T. Osmery', role: 'scheduler' }}
        onSignOut={onSignOut}
        waterline={
          <Waterline
            siteName="Larkfen"
            clock="10:42"
            vessels={[
              {
                tag: 'C03',
                temperatureC: 45,
                taken: 6,
                positions: 8,
                state: 'ok',
                sentence: 'C03 stands at 45 °C with 6 of 8 positions taken.',
                href: '/larkfen/equipment/C03',
              },
              {
                tag: 'C05',
                temperatureC: null,
                taken: 0,
                positions: 8,
                state: 'out',
                why: 'mapping',
                sentence: 'C05 is out of use for mapping.',
                href: '/larkfen/equipment/C05',
              },
            ]}
          />
        }
      >
        <Page title="Board">
          <Section title="Chambers">rows</Section>
        </Page>
      </AppShell>
    </MemoryRouter>,
  );
  return onSignOut;
}

describe('the frame of every page', () => {
  test('has a way past itself to the one main landmark', () => {
    renderShell();
    expect(screen.getByRole('link', { name: 'Skip to the page' }).getAttribute('href')).toBe(
      '#main',
    );
    expect(screen.getByRole('main').id).toBe('main');
    expect(screen.getByRole('heading', { level: 1 }).textContent).toBe('Board');
    expect(screen.getByRole('region', { name: 'Chambers' })).toBeTruthy();
  });

  test('marks the current word', () => {
    renderShell();
    const [nav] = screen.getAllByRole('navigation', { name: 'Main' });
    const current = nav?.querySelector('[aria-current="page"]');
    expect(current?.textContent).toBe('Board');
  });

  test('tells each chamber in a sentence and counts the positions', () => {
    renderShell();
    const waterline = screen.getByRole('region', { name: 'Waterline: chambers at Larkfen now' });
    expect(within(waterline).getByText(/6 of 16 positions taken/)).toBeTruthy();
    expect(
      within(waterline).getByRole('link', { name: /C05 is out of use for mapping\./ }),
    ).toBeTruthy();
  });

  test('opens the person’s slip, closes it on Escape and gives the focus back', async () => {
    const signOut = renderShell();
    const person = screen.getByRole('button', { name: 'T. Osmery, scheduler' });
    await userEvent.click(person);
    expect(person.getAttribute('aria-expanded')).toBe('true');
    await userEvent.keyboard('{Escape}');
    expect(person.getAttribute('aria-expanded')).toBe('false');
    expect(document.activeElement).toBe(person);
    await userEvent.click(person);
    const [leave] = screen.getAllByRole('button', { name: 'Sign out' });
    await userEvent.click(leave ?? person);
    expect(signOut).toHaveBeenCalledOnce();
  });

  test('opens its menu by keyboard and closes it on Escape', async () => {
    renderShell();
    const menu = screen.getByRole('button', { name: 'Menu' });
    menu.focus();
    await userEvent.keyboard('{Enter}');
    expect(menu.getAttribute('aria-expanded')).toBe('true');
    await userEvent.keyboard('{Escape}');
    expect(menu.getAttribute('aria-expanded')).toBe('false');
    expect(document.activeElement).toBe(menu);
  });
});

test('a dialog asks before the act and can be left', async () => {
  const confirm = vi.fn();
  const close = vi.fn();
  render(
    <Dialog
      isOpen
      title="Cancel booking 2418?"
      confirmLabel="Cancel booking 2418"
      onConfirm={confirm}
      onClose={close}
    />,
  );
  const dialog = screen.getByRole('dialog', { name: 'Cancel booking 2418?' });
  await userEvent.click(within(dialog).getByRole('button', { name: 'Keep as it is' }));
  expect(close).toHaveBeenCalledOnce();
  expect(confirm).not.toHaveBeenCalled();
  await userEvent.click(within(dialog).getByRole('button', { name: 'Cancel booking 2418' }));
  expect(confirm).toHaveBeenCalledOnce();
});

describe('the sign-in page', () => {
  const props = {
    organisation: 'Larkfen Cells',
    signInHref: '/auth/sign-in',
    helpHref: '/help',
    people: [
      { role: 'engineer', name: 'B. Hallowe', does: 'asks for slots', href: '/auth/sign-in?as=e' },
    ],
  };

  test('offers the demo’s people only where the stand-in runs', () => {
    const { rerender } = render(<SignInPage {...props} isStandIn />);
    expect(screen.getByRole('link', { name: 'engineer' }).getAttribute('href')).toBe(
      '/auth/sign-in?as=e',
    );
    rerender(<SignInPage {...props} isStandIn={false} />);
    expect(screen.queryByRole('link', { name: 'engineer' })).toBeNull();
    expect(
      screen
        .getByRole('link', { name: 'Sign in with your Larkfen Cells account' })
        .getAttribute('href'),
    ).toBe('/auth/sign-in');
  });
});

test('a booking at risk is told by its notch, not by colour alone', () => {
  render(
    <PhaseBar
      phases={[
        { phase: 'hold', seconds: 3600 },
        { phase: 'measure', seconds: 3600 },
      ]}
      width={200}
      number="2405"
      tone="at-risk"
      riskFromSeconds={5400}
      label="Booking 2405, at risk from 16:00."
    />,
  );
  const drawing = screen.getByRole('img', { name: 'Booking 2405, at risk from 16:00.' });
  expect(drawing.querySelector('[data-part="notch"]')).not.toBeNull();
  expect(drawing.textContent).toBe('2405');
});

test('the page of marks shows every mark with its word', () => {
  render(
    <MemoryRouter>
      <GalleryPage />
    </MemoryRouter>,
  );
  const calibration = screen.getByRole('region', { name: 'Calibration state' });
  expect(within(calibration).getAllByRole('listitem')).toHaveLength(6);
  expect(within(calibration).getByText('awaiting release')).toBeTruthy();
});
