import { chromium as driver } from 'playwright-core';
import { chromium } from './chromium.mjs';

/** Debian's Chromium, headless, without the background traffic that a closed network refuses. */
export const launchBrowser = () =>
  driver.launch({
    executablePath: chromium,
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
