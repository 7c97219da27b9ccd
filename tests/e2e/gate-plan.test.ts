import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { axeFindings } from '../support/axe';
import { screenshot } from '../support/browser';
import { signedIn, type SignedIn } from '../support/people';

/** A workspace of its own, so that the demo's plans stay as other tests find them. */
async function openWorkspace(lead: SignedIn): Promise<string> {
  const me = await lead.call('GET', '/api/v1/me');
  const studio = me.body.studios[0].slug;
  const { body } = await lead.call('POST', `/api/v1/studios/${studio}/workspaces`, {
    name: 'Plan of gates',
    // Its own, so that the test can run again on the same product.
    code: randomUUID()
      .replaceAll(/[^a-f]/g, '')
      .padEnd(4, 'G')
      .slice(0, 4)
      .toUpperCase(),
  });
  return body.slug;
}

describe('a lead changes the gate plan', () => {
  it('by keyboard on a phone, is told what cannot stand, and others see the next version at once', async () => {
    const lead = await signedIn('lewin', { viewport: { width: 360, height: 740 }, colorScheme: 'dark' });
    const designer = await signedIn('mara');
    try {
      const slug = await openWorkspace(lead);
      const { page, problems } = lead;
      await designer.page.goto(`/w/${slug}/gate-plan`, { waitUntil: 'networkidle' });
      await page.goto(`/w/${slug}/gate-plan`, { waitUntil: 'networkidle' });
      await page.getByRole('button', { name: 'Change the plan' }).press('Enter');
      const form = page.getByRole('form', { name: 'Change the gate plan' });
      await form.waitFor();
      expect(await axeFindings(page)).toEqual([]);
      const overhang = () => page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      expect(await overhang()).toBeLessThanOrEqual(0);

      // Nobody of the client is there yet: the gate that asks for them says so, and holds the focus.
      await form.getByRole('button', { name: 'Set as version 2' }).press('Enter');
      await form.getByText('Client asks for a signature, but nobody could give one here').waitFor();
      expect(
        await page.evaluate(() => document.activeElement?.closest('[data-gate]')?.textContent),
      ).toContain('Client asks for a signature');

      await form.getByRole('button', { name: 'Take out Client' }).press('Enter');
      await form.getByRole('button', { name: 'Add a gate that people sign' }).press('Enter');
      // The new gate is where one goes on.
      await page.keyboard.type('Tooling');
      const tooling = form.locator('[data-gate]', { has: page.getByRole('heading', { name: 'Tooling' }) });
      await tooling.getByText('One lead signs. Never the author').waitFor();
      await tooling.getByRole('button', { name: 'Move Tooling up' }).press('Enter');
      await page.getByText('Tooling is now gate 2 of 3.').waitFor({ state: 'attached' });
      expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-label'))).toBe(
        'Move Tooling up',
      );
      await tooling.getByLabel('Due').fill('3');
      await form.getByRole('checkbox', { name: 'This plan ends without the client' }).press('Space');
      expect(await axeFindings(page)).toEqual([]);
      expect(await overhang()).toBeLessThanOrEqual(0);
      await screenshot(page, 'gate-plan-editor-360-dark');
      await form.getByRole('button', { name: 'Set as version 2' }).press('Enter');
      await page.getByText('version 2', { exact: false }).first().waitFor();
      await form.waitFor({ state: 'detached' });

      await designer.page.getByText('Due 3 days after it opens.').first().waitFor();
      await designer.page.getByText('Added Tooling').waitFor();
      expect(await designer.page.getByRole('button', { name: 'Change the plan' }).count()).toBe(0);
      // The demo's studio has one designer: the page says so and offers nothing.
      await designer.page.getByText('You are the only designer here').waitFor();
      expect([...problems, ...designer.problems]).toEqual([]);
    } finally {
      await Promise.all([lead.context.close(), designer.context.close()]);
    }
  });
});
