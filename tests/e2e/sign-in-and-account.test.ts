import type { Page } from 'playwright-core';
import { describe, expect, inject, it } from 'vitest';
import { axeFindings } from '../support/axe';
import { visitor } from '../support/browser';

const { people } = inject('product');
const someone = people[0];

async function signIn(page: Page, next: string, password = someone.password): Promise<void> {
  await page.goto(`/sign-in?next=${encodeURIComponent(next)}`, { waitUntil: 'networkidle' });
  await page.getByLabel('E-mail').fill(someone.email);
  await page.getByRole('textbox', { name: 'Password' }).fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

const publicPages = [
  '/',
  '/sign-in',
  '/sign-in/code',
  '/forgot',
  '/reset',
  '/reset?token=x',
  '/verify',
  '/join/nonsense',
  '/nowhere',
];

describe.each(['light', 'dark'] as const)('public pages in the %s theme at 360 px', (colorScheme) => {
  it.each(publicPages)('%s: axe finds nothing, nothing scrolls sideways, one h1', async (path) => {
    const { context, page } = await visitor({ viewport: { width: 360, height: 740 }, colorScheme });
    await page.goto(path, { waitUntil: 'networkidle' });
    await page.locator('h1').waitFor();
    expect(await axeFindings(page)).toEqual([]);
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(360);
    expect(await page.locator('h1').count()).toBe(1);
    expect(await page.title()).toMatch(/Firstpull/);
    await context.close();
  });
});

describe('signing in', () => {
  it('names what is missing, moves there and keeps what was written', async () => {
    const { context, page } = await visitor();
    await page.goto('/sign-in', { waitUntil: 'networkidle' });
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByText('Write your e-mail address.').waitFor();
    expect(await page.evaluate(() => document.activeElement?.getAttribute('name'))).toBe('email');
    expect(await page.getByLabel('E-mail').getAttribute('aria-invalid')).toBe('true');
    expect(await axeFindings(page)).toEqual([]);

    await page.getByLabel('E-mail').fill(someone.email);
    await page.getByRole('textbox', { name: 'Password' }).fill('certainly not this one');
    await page.keyboard.press('Enter');
    await page.getByRole('alert').getByText('is not right').waitFor();
    expect(await page.getByLabel('E-mail').inputValue()).toBe(someone.email);
    await context.close();
  });

  it('goes where one wanted, and never to another origin', async () => {
    const { context, page } = await visitor();
    await page.goto('/account');
    await page.waitForURL('**/sign-in?next=%2Faccount');
    await signIn(page, '/account');
    await page.waitForURL('**/account');
    await context.clearCookies();
    await signIn(page, '//evil.example/today');
    await page.waitForURL('**/today');
    expect(new URL(page.url()).origin).toBe(new URL(inject('product').baseUrl).origin);
    await context.close();
  });
});

describe('the account page', () => {
  it('keeps theme and units from the first byte on, and has nothing for axe', async () => {
    const { context, page } = await visitor();
    await signIn(page, '/account');
    await page.getByText('this one').waitFor();
    const saved = page.waitForResponse(
      (r) => r.url().endsWith('/api/v1/me') && r.request().method() === 'PATCH',
    );
    await page.getByText('Inches', { exact: true }).click();
    expect((await saved).status()).toBe(200);
    await page.getByText('Dark', { exact: true }).click();
    await page.waitForFunction(() => document.documentElement.dataset.theme === 'dark');
    expect(await axeFindings(page)).toEqual([]);

    const html = await (await context.request.get('/account')).text();
    expect(html).toMatch(/<html[^>]*data-theme="dark"/);
    await page.reload({ waitUntil: 'networkidle' });
    expect(await page.getByRole('radio', { name: 'Inches' }).isChecked()).toBe(true);

    const restored = page.waitForResponse((r) => r.url().endsWith('/api/v1/me') && r.ok());
    await page.getByText('Millimetres', { exact: true }).click();
    await restored;
    await context.close();
  });

  it('lists another session and ends it', async () => {
    const mine = await visitor();
    await signIn(mine.page, '/account');
    await mine.page.getByText('this one').waitFor();
    const other = await visitor({
      userAgent: 'Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0',
    });
    await signIn(other.page, '/account');
    await other.page.getByText('this one').waitFor();

    await mine.page.reload({ waitUntil: 'networkidle' });
    await mine.page.getByRole('button', { name: 'End the session on Firefox on Linux' }).first().click();
    await mine.page.getByText('The session has ended.').waitFor();
    await other.page.goto('/account');
    await other.page.waitForURL('**/sign-in**');
    await mine.page.reload();
    await mine.page.getByText('this one').waitFor();
    await mine.context.close();
    await other.context.close();
  });

  it('is reached by keyboard: skip link first, menus open and give focus back', async () => {
    const { context, page } = await visitor();
    await signIn(page, '/account');
    await page.getByText('this one').waitFor();
    await page.reload({ waitUntil: 'networkidle' });
    await page.keyboard.press('Tab');
    expect(await page.evaluate(() => document.activeElement?.textContent)).toBe('Skip to the page');
    await page.keyboard.press('Enter');
    expect(await page.evaluate(() => document.activeElement?.id)).toBe('main');

    const you = page.getByRole('button', { name: `You: ${someone.name}` });
    await you.focus();
    await page.keyboard.press('Enter');
    await page.getByRole('menuitem', { name: 'Sign out' }).waitFor();
    expect(await axeFindings(page)).toEqual([]);
    await page.keyboard.press('Escape');
    await page.getByRole('menu').waitFor({ state: 'detached' });
    expect(await you.evaluate((element) => element === document.activeElement)).toBe(true);
    await context.close();
  });

  it('signs out for good: nothing is kept in the browser and the page is closed', async () => {
    const { context, page } = await visitor();
    await signIn(page, '/account');
    await page.getByText('this one').waitFor();
    const cookies = await context.cookies();
    await page.evaluate(() => localStorage.setItem('draft', 'canary'));
    await page.getByRole('button', { name: `You: ${someone.name}` }).click();
    await page.getByRole('menuitem', { name: 'Sign out' }).click();
    await page.waitForURL('**/sign-in');
    expect(await page.evaluate(() => localStorage.getItem('draft'))).toBeNull();
    await context.addCookies(cookies);
    await page.goto('/account');
    await page.waitForURL('**/sign-in**');
    await context.close();
  });
});
