import { Client } from 'pg';
import { createOTP } from '@better-auth/utils/otp';
import { base32 } from '@better-auth/utils/base32';
import type { Page } from 'playwright-core';
import { afterAll, describe, expect, inject, it } from 'vitest';
import { axeFindings } from '../support/axe';
import { screenshot, visitor } from '../support/browser';

const { adminUrl, people } = inject('product');
const ines = people.find(({ email }) => email.startsWith('ines@'))!;

// Whatever happens here, the others find her as she was.
afterAll(async () => {
  const client = new Client({ connectionString: adminUrl });
  await client.connect();
  await client.query('delete from two_factors');
  await client.query('update users set two_factor_enabled = false');
  await client.end();
});

async function givePassword(page: Page, next: string): Promise<void> {
  await page.goto(`/sign-in?next=${encodeURIComponent(next)}`, { waitUntil: 'networkidle' });
  await page.getByLabel('E-mail').fill(ines.email);
  await page.getByRole('textbox', { name: 'Password' }).fill(ines.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

const fits = async (page: Page) =>
  (await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth)) <= 0;

describe('a second factor', () => {
  it('is set up, signs in with a code and with a recovery code, is asked for at a gate, and turned off', async () => {
    const { context, page, problems } = await visitor({ viewport: { width: 360, height: 780 } });
    await givePassword(page, '/account');
    await page.waitForURL('**/account');
    await page.getByRole('button', { name: 'Set it up' }).click();
    await page.getByLabel('Your password').fill(ines.password);
    await page.getByRole('button', { name: 'Go on' }).click();
    await page.getByRole('img', { name: /QR code/ }).waitFor();
    const secret = await page.getByRole('group', { name: 'Secret' }).locator('p.font-mono').textContent();
    const otp = createOTP(new TextDecoder().decode(base32.decode(secret!.replaceAll(' ', ''))));
    const codeOf = (steps: number) => otp.hotp(Math.floor(Date.now() / 30_000) + steps);
    expect(await axeFindings(page)).toEqual([]);
    expect(await fits(page)).toBe(true);
    await screenshot(page, 'second-factor-secret-360');
    await page.emulateMedia({ colorScheme: 'dark' });
    await page.setViewportSize({ width: 768, height: 900 });
    expect(await axeFindings(page)).toEqual([]);
    expect(await fits(page)).toBe(true);
    await screenshot(page, 'second-factor-secret-768-dark');
    await page.emulateMedia({ colorScheme: 'light' });
    await page.setViewportSize({ width: 360, height: 780 });
    await page.getByLabel('Code of your authenticator').fill(await codeOf(0));
    await page.getByRole('button', { name: 'Turn it on' }).click();
    const codes = page.getByRole('region', { name: 'Recovery codes' });
    await codes.waitFor();
    const recovery = await codes.getByRole('listitem').allTextContents();
    expect(recovery).toHaveLength(10);
    expect(await axeFindings(page)).toEqual([]);
    expect(await fits(page)).toBe(true);
    await screenshot(page, 'second-factor-codes-360');
    await page.getByRole('button', { name: 'I have kept them' }).click();
    await page.getByText('10 recovery codes are left').waitFor();

    // The second step of signing in; what the password alone opens is nothing.
    await context.clearCookies();
    await givePassword(page, '/account');
    await page.waitForURL('**/sign-in/code?next=%2Faccount');
    expect((await context.request.get('/api/v1/me')).status()).toBe(401);
    expect(await axeFindings(page)).toEqual([]);
    expect(await fits(page)).toBe(true);
    await screenshot(page, 'second-factor-code-360');
    await page.getByLabel('Code of your authenticator').fill('000000');
    await page.keyboard.press('Enter');
    await page.getByRole('alert').getByText('not the code').waitFor();
    const code = await codeOf(1);
    await page.getByLabel('Code of your authenticator').fill(code);
    await page.keyboard.press('Enter');
    await page.waitForURL('**/account');

    // A gate asks for a code too, and takes none twice: the one that signed in signs nothing.
    const { workspaces } = (await (await context.request.get('/api/v1/me')).json()) as {
      workspaces: { slug: string; name: string }[];
    };
    const { slug } = workspaces.find(({ name }) => name.startsWith('Tamsin'))!;
    const list = await context.request.get(`/api/v1/workspaces/${slug}/templates?limit=100`);
    const { items } = (await list.json()) as { items: { id: string; title: string }[] };
    const { id } = items.find(({ title }) => title.startsWith('Seedling insert'))!;
    await page.goto(`/w/${slug}/templates/${id}/A`, { waitUntil: 'networkidle' });
    await page.getByRole('button', { name: /^Sign for/ }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Your password').fill(ines.password);
    await dialog.getByLabel('Code of your authenticator').fill(code);
    expect(await axeFindings(page)).toEqual([]);
    await screenshot(page, 'second-factor-sign-360');
    await dialog.getByRole('button', { name: /^Sign as/ }).click();
    await dialog
      .getByText(/used already/)
      .first()
      .waitFor();
    await dialog.getByRole('button', { name: 'Cancel' }).click();
    await page.getByRole('button', { name: /^Sign for/ }).waitFor();

    await context.clearCookies();
    await givePassword(page, '/account');
    await page.getByRole('button', { name: 'Use a recovery code' }).click();
    await page.getByLabel('Recovery code').fill(recovery[0].toUpperCase());
    await page.keyboard.press('Enter');
    await page.waitForURL('**/account');
    await page.getByText('9 recovery codes are left').waitFor();

    await page.setViewportSize({ width: 1440, height: 900 });
    await page.getByRole('button', { name: 'Turn it off' }).click();
    await page.getByLabel('Your password').fill(ines.password);
    // The password is not enough to do away with it; a recovery code serves where no authenticator is at hand.
    await page.getByLabel(/or a recovery code/).fill(recovery[1]);
    expect(await axeFindings(page)).toEqual([]);
    await screenshot(page, 'second-factor-off-1440');
    await page.getByRole('button', { name: 'Turn it off' }).click();
    await page.getByText('The password alone signs you in.').waitFor();
    expect(problems.filter((problem) => !/40[013]/.test(problem))).toEqual([]);
    await context.close();
  });
});
