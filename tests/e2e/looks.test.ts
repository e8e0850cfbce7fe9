import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import { launchBrowser, openPage } from './browser';
import { openOffice, signIn } from './office';
import type { Office } from './office';

const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

let office: Office;
let browser: Browser;

beforeAll(async () => {
  [office, browser] = await Promise.all([openOffice(), launchBrowser()]);
});
afterAll(async () => {
  await browser.close();
  await office.close();
});

interface Violation {
  id: string;
  nodes: { html: string }[];
}

/** What axe finds wrong with the page as it stands. */
const faultsOf = async (page: Page): Promise<string[]> => {
  // What is still fading in has not its own colours yet.
  await page.waitForFunction(() =>
    document
      .getAnimations()
      .every((one) => one.playState === 'finished' || one.effect?.getComputedTiming().endTime === Infinity),
  );
  await page.evaluate(axe);
  const found = await page.evaluate<Violation[]>(
    `axe.run(document, { resultTypes: ['violations'] }).then((result) => result.violations)`,
  );
  return found.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html.slice(0, 120)).join(' ')}`);
};

/** What sticks out of the page at its right. */
const sticksOut = (page: Page): Promise<string[]> =>
  page.evaluate(() => {
    if (document.documentElement.scrollWidth <= window.innerWidth) return [];
    return [...document.querySelectorAll('body *')]
      .filter((element) => element.getBoundingClientRect().right > window.innerWidth + 1)
      .map((element) => element.outerHTML.slice(0, 120));
  });

/** Controls that are too small to hit; names of those smaller than `least` pixels either way. */
const tooSmall = (page: Page, least: number): Promise<string[]> =>
  page.evaluate((size) => {
    const controls = document.querySelectorAll('button, select, input:not([type=checkbox]), textarea');
    return [...controls].flatMap((control) => {
      const box = control.getBoundingClientRect();
      // a button of a table's row is as large as its row
      const reach = getComputedStyle(control, '::after').position === 'absolute';
      if (box.width === 0 || reach || control.closest('td') !== null) return [];
      return box.height >= size - 0.5 ? [] : [`${control.outerHTML.slice(0, 90)} is ${box.height}`];
    });
  }, least);

const screens = [
  { name: 'projects', path: '/projects', wait: 'Ferry landing' },
  { name: 'a project', path: '/projects/p2', wait: 'R5' },
  { name: 'fastening, flat', path: '/members/m2/fastening', wait: 'Rules of the member' },
  { name: 'fastening, box', path: '/members/m7/fastening', wait: 'Rules of the member' },
  { name: 'a schedule', path: '/members/m4/schedule', wait: 'To bring' },
  { name: 'a schedule that is over', path: '/members/m10/schedule', wait: 'To bring' },
  { name: 'a glued joint', path: '/members/m7/schedule', wait: 'To bring' },
  { name: 'nothing', path: '/nowhere', wait: 'Nothing is here' },
];

const widths = [390, 820, 1440];

describe.each(['light', 'dark'] as const)('%s', (colorScheme) => {
  it.each(widths)('is readable for everybody and keeps to its width at %i px', async (width) => {
    const touch = width < 500;
    const { page, faults } = await openPage(browser, {
      viewport: { width, height: 900 },
      colorScheme,
      hasTouch: touch,
      isMobile: touch,
    });
    await page.goto(`${office.address}/sign-in`);
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    expect(await faultsOf(page), 'sign in').toEqual([]);
    await signIn(page, office, 'rolf');
    for (const { name, path, wait } of screens) {
      await page.goto(office.address + path);
      await page.getByText(wait, { exact: true }).first().waitFor();
      expect(await faultsOf(page), name).toEqual([]);
      expect(await sticksOut(page), name).toEqual([]);
      expect(await tooSmall(page, touch ? 44 : 32), name).toEqual([]);
    }
    await page.goto(`${office.address}/members/m4/schedule`);
    await page.getByRole('button', { name: 'Tables' }).click();
    await page.getByRole('table', { name: 'Moment M' }).waitFor();
    expect(await faultsOf(page), 'tables').toEqual([]);
    expect(await sticksOut(page), 'tables').toEqual([]);
    await page.getByRole('button', { name: /Rolf Amber/ }).click();
    await page.getByRole('button', { name: 'Sign out', exact: true }).waitFor();
    expect(await faultsOf(page), 'the person’s menu').toEqual([]);
    expect(faults).toEqual([]);
    await page.context().close();
  });
});

describe('the theme', () => {
  it('is the person’s own, over the system’s, from the next start on', async () => {
    const { page } = await openPage(browser, { colorScheme: 'light' });
    await signIn(page, office, 'ines');
    await page.goto(`${office.address}/projects`);
    const background = () => page.evaluate(() => getComputedStyle(document.body).backgroundColor);
    await page.getByText('Ferry landing').waitFor();
    const light = await background();
    await page.getByRole('button', { name: /Ines Vale/ }).click();
    await page.getByRole('button', { name: 'Dark' }).click();
    await expect.poll(background).not.toBe(light);
    const dark = await background();
    await page.reload();
    await page.getByText('Ferry landing').waitFor();
    expect(await background()).toBe(dark);
    await page.context().close();
  });
});
