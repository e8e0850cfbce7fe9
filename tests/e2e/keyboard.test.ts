import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import { launchBrowser, openPage } from './browser';
import type { Watched } from './browser';
import { memberOf, openOffice, personCalled, signIn } from './office';
import type { Office } from './office';

let office: Office;
let browser: Browser;
let watched: Watched;
let page: Page;

beforeAll(async () => {
  [office, browser] = await Promise.all([openOffice(), launchBrowser()]);
});
afterAll(async () => {
  await browser.close();
  await office.close();
});
afterEach(async () => {
  await page.context().close();
  expect(watched.faults).toEqual([]);
});

const press = (...keys: string[]) =>
  keys.reduce((before, key) => before.then(() => page.keyboard.press(key)), Promise.resolve());

/** What has the focus, as a screen reader would name it, and whether one can see that it has. */
const focused = () =>
  page.evaluate(() => {
    const element = document.activeElement;
    if (!(element instanceof HTMLElement)) return { name: '', ring: false };
    const labels = element instanceof HTMLInputElement ? Array.from(element.labels ?? []) : [];
    const labelled = labels.map((label) => label.textContent).join(' ');
    const name = element.getAttribute('aria-label') ?? (labelled === '' ? element.textContent : labelled);
    const { outlineStyle, outlineWidth } = getComputedStyle(element);
    return { name: name.trim(), ring: outlineStyle !== 'none' && parseFloat(outlineWidth) >= 2 };
  });

/** Presses Tab until something of that name has the focus; fails after a page's worth of stops. */
const tabTo = async (name: RegExp): Promise<void> => {
  const met: string[] = [];
  for (let stops = 0; stops < 80; stops += 1) {
    await press('Tab');
    const here = await focused();
    if (name.test(here.name)) {
      expect(here.ring, `${here.name} shows that it has the focus`).toBe(true);
      return;
    }
    met.push(here.name);
  }
  throw new Error(`Tab never came to ${name}; it met ${met.join(' | ')}`);
};

const place = () => page.getByRole('slider').getAttribute('aria-valuenow').then(Number);
const readout = async () =>
  (await page.getByRole('region', { name: 'At x' }).innerText()).replace(/\s+/g, ' ');

describe('the cursor', () => {
  it('goes by steps, to events and to both ends', async () => {
    watched = await openPage(browser, {});
    page = watched.page;
    await signIn(page, office, 'rolf');
    await page.goto(`${office.address}/members/m3/schedule`);
    await page.getByRole('slider').focus();
    const { document, result } = await memberOf(page, office, 'm3');

    await press('End');
    expect(await place()).toBe(document.length);
    await press('Home');
    expect(await place()).toBe(0);
    expect(await readout()).toContain('0 mm');
    await press('ArrowRight');
    const step = await place();
    expect(step).toBeGreaterThan(0);
    await press('ArrowRight', 'ArrowRight', 'ArrowLeft');
    expect(await place()).toBe(2 * step);

    // every zone's border and every point load is an event
    const stops: number[] = [];
    await press('Home');
    while ((await place()) < document.length) {
      await press('Shift+ArrowRight');
      stops.push(await place());
    }
    for (const zone of result.interfaces[0].zones) expect(stops).toContain(zone.to);
    for (const one of document.loadCases)
      for (const load of one.loads) if (load.kind === 'point') expect(stops).toContain(load.x);

    // the readout names the zone of the place
    await press('Home', 'Shift+ArrowRight');
    const first = stops[0] ?? 0;
    const index = result.interfaces[0].zones.findIndex((zone: { to: number }) => first < zone.to);
    const zone = Number(index) + 1;
    expect(await readout()).toContain(`${zone} · at ${result.interfaces[0].zones[index].spacing}`);

    await press('t');
    await page.getByRole('table', { name: 'Shear V' }).waitFor();
    await press('t');
    await page.getByRole('slider').waitFor();
    // with nothing in focus the arrow keys are still the cursor's
    await page.evaluate(() => {
      if (window.document.activeElement instanceof HTMLElement) window.document.activeElement.blur();
    });
    await press('Home');
    expect(await place()).toBe(0);
  });
});

describe('by keyboard alone', () => {
  it('one signs in, finds a member, changes it and reads its schedule', async () => {
    watched = await openPage(browser, {});
    page = watched.page;
    await page.goto(`${office.address}/`);
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    const rolf = personCalled('rolf');
    await tabTo(/^E-mail/);
    await page.keyboard.type(rolf.email);
    await tabTo(/^Password/);
    await page.keyboard.type(rolf.password);
    await press('Enter');
    await page.getByRole('link', { name: 'Ferry landing' }).waitFor();
    await tabTo(/^Ferry landing$/);
    await press('Enter');
    await page.getByRole('link', { name: 'B4' }).waitFor();
    await tabTo(/^B4$/);
    await press('Enter');
    await page.getByRole('slider').waitFor();
    await tabTo(/Fastening/);
    await press('Enter');
    await page.getByLabel('Rows').waitFor();
    await tabTo(/^Rows$/);
    await press('Control+a');
    await page.keyboard.type('4');
    await page.waitForResponse((answer) => answer.url().endsWith('/draft') && answer.ok());
    expect((await memberOf(page, office, 'm4')).document.connections[0].rows).toBe(4);

    // out of the fields, Ctrl+Z takes the change back
    await tabTo(/^Fastener$/);
    await press('Control+z');
    await expect.poll(async () => (await memberOf(page, office, 'm4')).document.connections[0].rows).toBe(3);

    await page.goto(`${office.address}/members/m4/schedule`);
    await page.getByRole('slider').waitFor();
    await tabTo(/^Place along the beam$/);
    await press('Home', 'ArrowRight');
    expect(await place()).toBeGreaterThan(0);
    await tabTo(/^2$/);
    await press('Enter');
    expect(await readout()).toMatch(/2 · at/);
  });
});
