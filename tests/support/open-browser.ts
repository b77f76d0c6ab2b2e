import { chromium } from 'playwright-core';
import type { Browser, Page } from 'playwright-core';

/** Debian's Chromium, told not to look for anything outside this machine. */
export function openBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: '/usr/bin/chromium',
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
}

/** Signs a demo person in through the stand-in and ends on the page asked for. */
export async function signIn(page: Page, url: string, sub: string, path: string): Promise<void> {
  await page.goto(`${url}/auth/sign-in?as=${sub}&return=${encodeURIComponent(path)}`);
  const { pathname } = new URL(path, url);
  await page.waitForURL((address) => address.origin === url && address.pathname === pathname);
}
