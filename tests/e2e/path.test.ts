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

const open = async (): Promise<void> => {
  watched = await openPage(browser, {});
  page = watched.page;
};
const openAs = async (key: Parameters<typeof signIn>[2], path: string): Promise<void> => {
  await open();
  await signIn(page, office, key);
  await page.goto(office.address + path);
};

const heading = (name: string | RegExp) => page.getByRole('heading', { level: 1, name });
const status = () => page.getByRole('status').first();
const saved = () =>
  status()
    .filter({ hasText: /^Saved/ })
    .waitFor();
/** The first field of that label: the first joint's. */
const field = (label: string) => page.getByLabel(label, { exact: true }).first();
const row = (name: RegExp) => page.getByRole('row', { name });

/** Spacings as the zones table shows them. */
const shownSpacings = async (): Promise<string[]> =>
  page
    .getByRole('table', { name: /^Zones of/ })
    .locator('tbody tr td:nth-child(4)')
    .allInnerTexts();

describe('the way in', () => {
  it('asks to sign in, says what is wrong, and goes where one was going', async () => {
    await open();
    await page.goto(`${office.address}/members/m1/fastening`);
    await heading('Sign in').waitFor();
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByText('Enter your e-mail address').waitFor();
    const rolf = personCalled('rolf');
    await page.getByLabel('E-mail').fill(rolf.email);
    await page.getByLabel('Password').fill('not the password');
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByRole('alert').waitFor();
    expect(await page.getByLabel('E-mail').inputValue()).toBe(rolf.email);
    await page.getByLabel('Password').fill(rolf.password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await heading(/^B1 · /).waitFor();
    expect(new URL(page.url()).pathname).toBe('/members/m1/fastening');

    await page.getByRole('button', { name: /Rolf Amber/ }).click();
    await page.getByRole('button', { name: 'Sign out', exact: true }).click();
    await heading('Sign in').waitFor();
    await page.goto(`${office.address}/projects`);
    await heading('Sign in').waitFor();
  });

  it('does not follow an address to another site', async () => {
    await open();
    await page.goto(`${office.address}/sign-in?to=//elsewhere.example/`);
    const rolf = personCalled('rolf');
    await page.getByLabel('E-mail').fill(rolf.email);
    await page.getByLabel('Password').fill(rolf.password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await heading('Projects').waitFor();
    expect(page.url()).toBe(`${office.address}/projects`);
  });
});

describe('projects', () => {
  it('are searched and ordered by what the address says', async () => {
    await openAs('rolf', '/projects');
    await row(/Ferry landing/).waitFor();
    await page.getByRole('searchbox').fill('boat');
    await row(/Ferry landing/).waitFor({ state: 'detached' });
    await page.getByRole('button', { name: 'Project', exact: true }).click();
    await page.waitForURL(/sort=name/);
    expect(new URL(page.url()).searchParams.get('q')).toBe('boat');

    await page.goto(`${office.address}/projects?sort=-number`);
    await row(/Ferry landing/).waitFor();
    const numbers = await page.locator('tbody tr td:first-child').allInnerTexts();
    expect(numbers.length).toBeGreaterThan(1);
    expect(numbers).toEqual([...numbers].sort().reverse());

    await page.getByRole('searchbox').fill('no such thing');
    await page.getByText('No project has “no such thing”').waitFor();
    await page.getByRole('button', { name: 'Show all projects' }).click();
    await row(/Ferry landing/).waitFor();
  });

  it('lead to their members, and say which is over', async () => {
    await openAs('mira', '/projects');
    await page.getByRole('link', { name: 'Boathouse roof' }).click();
    await heading('Boathouse roof').waitFor();
    await row(/^R5 .*over/).waitFor();
    await page.getByRole('link', { name: 'R1' }).click();
    await heading(/^R1 · /).waitFor();
    await page.getByRole('table', { name: 'Zones of J1' }).waitFor();
  });

  it('that are not there say so', async () => {
    await openAs('rolf', '/projects/none');
    await page.getByText('There is no such project').waitFor();
    await page.goto(`${office.address}/nowhere`);
    await heading('Nothing is here').waitFor();
  });
});

describe('a change in Fastening', () => {
  it('is worked out on the server and changes the schedule', async () => {
    await openAs('rolf', '/members/m1/schedule');
    await page.getByRole('table', { name: 'Zones of J1' }).waitFor();
    const before = await shownSpacings();
    const versionBefore = (await memberOf(page, office, 'm1')).version;

    await page.getByRole('link', { name: /Fastening/ }).click();
    await field('Rows').fill('3');
    await page.waitForResponse((answer) => answer.url().endsWith('/draft') && answer.ok());
    await saved();
    await page.getByRole('link', { name: /Schedule/ }).click();
    await page.getByText('3 rows').waitFor();
    const after = await shownSpacings();
    expect(after).not.toEqual(before);

    const { document, result, version } = await memberOf(page, office, 'm1');
    expect(version).toBe(Number(versionBefore) + 1);
    expect(document.connections[0].rows).toBe(3);
    expect(after).toEqual(
      result.interfaces[0].zones.map((zone: { spacing: number }) => String(zone.spacing)),
    );

    await page.getByRole('button', { name: 'Undo' }).click();
    await page.getByText('2 rows').waitFor();
    expect(await shownSpacings()).toEqual(before);
  });

  it('that is refused says so at the field, and loses nothing, not even over a reload', async () => {
    await openAs('rolf', '/members/m3/fastening');
    const kept = await field('Factor of safety').inputValue();
    await field('Factor of safety').fill('0.5');
    await page.getByText('The factor of safety must be 1 or more').first().waitFor();
    await page.getByRole('alert').getByText('The figures are those of').waitFor();
    expect(await field('Factor of safety').getAttribute('aria-invalid')).toBe('true');
    await field('Rows').fill('two');
    await page.getByText('“two” is not understood: write a plain number').waitFor();
    await saved();

    // the old schedule stays, marked as of its time
    await page.getByRole('link', { name: /Schedule/ }).click();
    await page.getByText('before the change that is refused').waitFor();
    await page.getByRole('table', { name: 'Zones of J1' }).waitFor();

    await page.reload();
    await page.getByText('No schedule yet').waitFor();
    await page.getByRole('link', { name: /Fastening/ }).click();
    expect(await field('Rows').inputValue()).toBe('two');
    expect(await field('Factor of safety').inputValue()).toBe('0.5');

    await field('Rows').fill('1');
    await field('Factor of safety').fill(kept);
    await page.getByRole('alert').waitFor({ state: 'detached' });
    expect((await memberOf(page, office, 'm3')).result).not.toBeNull();
  });

  it('takes what people type, whatever their units, and stores it in millimetres and newtons', async () => {
    await openAs('rolf', '/members/m2/fastening');
    await field('Ultimate, one fastener').fill('2.1 kN');
    await page.getByText('= 2\u202f100\u00a0N').waitFor();
    await page.waitForResponse((answer) => answer.url().endsWith('/draft') && answer.ok());
    await saved();
    const { document: before, version } = await memberOf(page, office, 'm2');
    expect(before.connections[0].capacity.value).toBe(2100);

    await page.getByRole('button', { name: /^ft-in/ }).click();
    // 2100 N ÷ (0.45359237 · 9.80665) = 472.098… lb
    await expect.poll(() => field('Ultimate, one fastener').inputValue()).toBe('472.099');
    await page.getByRole('button', { name: /^mm/ }).click();
    await expect.poll(() => field('Ultimate, one fastener').inputValue()).toBe('2\u202f100');
    const after = await memberOf(page, office, 'm2');
    expect(after.document).toEqual(before);
    expect(after.version).toBe(version);
  });

  it('can join what nothing joins, by glue as well', async () => {
    await openAs('rolf', '/members/m2/fastening');
    await page.getByRole('button', { name: /^Add connection to J1/ }).click();
    await page.getByRole('heading', { name: /^J1 / }).waitFor();
    await field('Joined by').selectOption('adhesive');
    await page.getByText('The ultimate value is missing').first().waitFor();
    await field('Ultimate shear stress').fill('2.4');
    await field('Factor of safety').fill('3');
    await page.getByRole('alert').waitFor({ state: 'detached' });
    await saved();
    const { result } = await memberOf(page, office, 'm2');
    // R = 2.4/3
    expect(result.interfaces[0]).toMatchObject({
      id: 'J1',
      kind: 'adhesive',
      capacity: expect.closeTo(0.8, 9),
    });
    await page.getByRole('button', { name: 'Remove what joins J1' }).click();
    await page.getByRole('button', { name: /^Add connection to J1/ }).waitFor();
    await saved();
  });

  it('is not open to the checker', async () => {
    await openAs('mira', '/members/m1/fastening');
    await page.getByText('You may read this member, not change it.').waitFor();
    expect(await field('Rows').isEditable()).toBe(false);
    expect(await field('Joined by').isDisabled()).toBe(true);
    expect(await page.getByRole('button', { name: /Undo|Add connection|Remove/ }).count()).toBe(0);
  });
});

describe('when saving does not go smoothly', () => {
  it('keeps what was typed while the server is away, and saves when it is back', async () => {
    await openAs('rolf', '/members/m5/fastening');
    await field('Rows').waitFor();
    await page.route('**/api/members/*/draft', (route) => route.abort());
    await field('Rows').fill('3');
    await page.getByText('not saved, trying again').waitFor();
    expect(await field('Rows').inputValue()).toBe('3');
    expect((await memberOf(page, office, 'm5')).document.connections[0].rows).toBe(2);
    await page.unroute('**/api/members/*/draft');
    await page.getByRole('button', { name: 'Now' }).click();
    await saved();
    expect((await memberOf(page, office, 'm5')).document.connections[0].rows).toBe(3);
  });

  it('shows who saved first, and loses neither document', async () => {
    await openAs('rolf', '/members/m6/fastening');
    await field('Rows').waitFor();
    const elsewhere = async (rows: number) => {
      const { document, version } = await memberOf(page, office, 'm6');
      document.connections[0].rows = rows;
      const answer = await page.request.put(`${office.address}/api/members/m6/draft`, {
        data: { document },
        headers: { 'if-match': `"${version}"` },
      });
      expect(answer.status()).toBe(200);
    };
    const stored = async () => (await memberOf(page, office, 'm6')).document.connections[0].rows;

    await elsewhere(4);
    await field('Rows').fill('5');
    await page.getByText('Rolf Amber saved this member').waitFor();
    await page.getByRole('row', { name: /rows 5 4/ }).waitFor();
    expect(await stored()).toBe(4);
    await page.getByRole('button', { name: 'Take theirs' }).click();
    expect(await field('Rows').inputValue()).toBe('4');
    await page.getByRole('button', { name: 'Undo' }).click();
    expect(await field('Rows').inputValue()).toBe('5');
    await expect.poll(stored).toBe(5);

    await elsewhere(6);
    await field('Rows').fill('7');
    await page.getByRole('button', { name: 'Keep mine, save over theirs' }).click();
    await expect.poll(stored).toBe(7);
    await page.getByRole('button', { name: 'Undo' }).click();
    expect(await field('Rows').inputValue()).toBe('6');
    await expect.poll(stored).toBe(6);
  });
});
