import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';
import { chromium } from 'playwright-core';
import type { Browser, BrowserContextOptions, Page } from 'playwright-core';

const names = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable'];
const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-dev-shm-usage',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

const isProgram = (path: string): boolean => {
  try {
    accessSync(path, constants.X_OK);
    return true;
  } catch {
    return false;
  }
};

/** Where the machine keeps Chromium; says the one command that installs it where it has none. */
function findChromium(): string {
  const wanted = process.env.CHROMIUM;
  const places = (process.env.PATH ?? '').split(delimiter).filter((folder) => folder !== '');
  const found = [wanted ?? '', ...places.flatMap((folder) => names.map((name) => join(folder, name)))].find(
    (path) => path !== '' && isProgram(path),
  );
  if (found === undefined)
    throw new Error('No Chromium on this machine. Install it with: sudo apt-get install --yes chromium');
  return found;
}

/** Starts a browser without a window. */
export function launchBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: findChromium(), args: flags });
}

/** A page, and everything that went wrong on it which the person would not see. */
export interface Watched {
  page: Page;
  /** errors of scripts and messages of the console's error level, but for answers that the test expects */
  faults: string[];
}

const expectedAnswers = /status of (401|403|404|412|422)|ERR_FAILED|ERR_INTERNET_DISCONNECTED/;

/** Opens a page in a context of its own. */
export async function openPage(browser: Browser, options: BrowserContextOptions): Promise<Watched> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 }, ...options });
  const page = await context.newPage();
  page.setDefaultTimeout(20_000);
  const faults: string[] = [];
  page.on('pageerror', (error) => faults.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error' && !expectedAnswers.test(message.text())) faults.push(message.text());
  });
  return { page, faults };
}
