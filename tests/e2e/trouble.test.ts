import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { bonbonMould, giftCover } from '@/db/seed/templates';
import { signedIn, workspaceOf, type SignedIn } from '../support/people';
import { crashService, startService, stopService } from '../support/product';

async function newTemplate(
  person: SignedIn,
  title: string,
): Promise<{ api: string; id: string; path: string }> {
  const { slug } = workspaceOf(person, 'Quillon');
  const api = `/api/v1/workspaces/${slug}`;
  const key = { 'idempotency-key': `open ${title} ${Date.now()}` };
  const made = await person.call('POST', `${api}/templates`, { title, dueOn: null }, key);
  expect(made.status, JSON.stringify(made.body)).toBeLessThan(300);
  return { api, id: made.body.id, path: `/w/${slug}/templates/${made.body.id}` };
}

const stl = (name: string, bytes: Uint8Array) => ({
  name,
  mimeType: 'model/stl',
  buffer: Buffer.from(bytes),
});

type StlFile = { name: string; mimeType: string; buffer: Buffer };

const bad: { what: string; file: () => StlFile | Promise<StlFile>; says: RegExp }[] = [
  {
    what: 'a picture renamed',
    file: () => stl('picture.stl', readFileSync('public/apple-touch-icon.png')),
    says: /the file is a PNG picture, not a mesh/i,
  },
  {
    what: 'a count field of 0xFFFFFFFF',
    file: () => {
      const bytes = new Uint8Array(84);
      new DataView(bytes.buffer).setUint32(80, 0xffffffff, true);
      return stl('count.stl', bytes);
    },
    says: /the header says 4294967295 facets/i,
  },
  {
    what: 'half a file',
    file: async () => stl('half.stl', (await bonbonMould({ ventedRows: 2, ventMm: 1 })).subarray(0, 40_000)),
    says: /the file has room for 798 and ends 16 bytes into the next one/i,
  },
];

describe('wrong files', () => {
  it.each(bad)(
    '$what is refused with what is wrong and what to do; the draft stays',
    async ({ what, file, says }) => {
      const designer = await signedIn('mara');
      const { path } = await newTemplate(designer, what.slice(0, 25));
      await designer.page.goto(`${path}/post`);
      await designer.page.getByLabel('What to look at').fill('This text must stay.');
      await designer.page.locator('input[type=file]').setInputFiles(await file());
      await designer.page.getByText('This file cannot be used').waitFor();
      expect(await designer.page.getByText(says).count()).toBeGreaterThan(0);
      await designer.page.getByText('The draft is saved.').waitFor();
      await designer.page.reload();
      expect(await designer.page.getByLabel('What to look at').inputValue()).toBe('This text must stay.');
      expect(await designer.page.getByRole('button', { name: 'Post revision A' }).isDisabled()).toBe(true);
      await designer.context.close();
    },
  );
});

describe('a killed worker', () => {
  it('loses nothing: the run is taken up again and completes', async () => {
    const designer = await signedIn('mara');
    const { api, id, path } = await newTemplate(designer, 'Killed in mid-run');
    await designer.page.goto(`${path}/post`);
    await designer.page
      .locator('input[type=file]')
      .setInputFiles(stl('mould.stl', await bonbonMould({ ventedRows: 4, ventMm: 1 })));
    await designer.page.getByText('SHA-256').waitFor();
    await designer.page.getByRole('button', { name: 'Post revision A' }).click();
    await designer.page.waitForURL(/\/A$/);
    await crashService('worker');
    const revisions = await designer.call('GET', `${api}/templates/${id}/revisions`);
    const [{ id: revisionId }] = revisions.body as {
      id: string;
    }[];
    await expect
      .poll(async () => (await designer.call('GET', `${api}/revisions/${revisionId}`)).body.check.state, {
        timeout: 120_000,
        interval: 500,
      })
      .toBe('finished');
    await designer.page.getByText('Docket').first().waitFor();
    await designer.context.close();
  });
});

describe('a lost network', () => {
  it('keeps a note that is being written, and sends it once when the network is back', async () => {
    const reviewer = await signedIn('pia');
    const { slug } = workspaceOf(reviewer, 'Quillon');
    const list = await reviewer.call('GET', `/api/v1/workspaces/${slug}/templates?limit=100`);
    const mould = (list.body.items as { id: string; number: string; latestRevisionId: string }[]).find(
      (t) => t.number === 'QP-002',
    )!;
    await reviewer.page.goto(`/w/${slug}/templates/${mould.id}/A`, { waitUntil: 'networkidle' });
    await reviewer.page.getByRole('button', { name: 'Add a note' }).click();
    const text = `Written without a network, ${Date.now()}`;
    await reviewer.context.setOffline(true);
    await reviewer.page.getByRole('textbox', { name: 'New note' }).fill(text);
    await reviewer.page.getByRole('button', { name: 'Post the note' }).click();
    await reviewer.page.getByText(text).first().waitFor();
    await reviewer.context.setOffline(false);
    const said = async () => {
      const docket = await reviewer.call(
        'GET',
        `/api/v1/workspaces/${slug}/revisions/${mould.latestRevisionId}/docket`,
      );
      return JSON.stringify(docket.body).split(`"text":"${text}"`).length - 1;
    };
    await expect.poll(async () => (await said()) > 0, { timeout: 60_000, interval: 500 }).toBe(true);
    await reviewer.page.reload({ waitUntil: 'networkidle' });
    await reviewer.page.getByText(text).first().waitFor();
    // `body` and `text` of the one note may both hold the words; a second note would double them.
    const threads = (
      await reviewer.call('GET', `/api/v1/workspaces/${slug}/revisions/${mould.latestRevisionId}/docket`)
    ).body.threads as { notes: { text: string }[] }[];
    expect(threads.flatMap((thread) => thread.notes).filter((note) => note.text === text)).toHaveLength(1);
    await reviewer.context.close();
  });
});

describe('a stopped realtime server', () => {
  it('is said plainly, and the page goes on by asking', async () => {
    const approver = await signedIn('anselm');
    const { slug } = workspaceOf(approver, 'Quillon');
    const list = await approver.call('GET', `/api/v1/workspaces/${slug}/templates?limit=100`);
    const mould = (list.body.items as { id: string; number: string; latestRevisionId: string }[]).find(
      (t) => t.number === 'QP-002',
    )!;
    await approver.page.goto(`/w/${slug}/templates/${mould.id}/A`, { waitUntil: 'networkidle' });
    await stopService('realtime');
    try {
      await approver.page
        .getByText('Live updates are off, checking every 15 seconds.')
        .waitFor({ timeout: 60_000 });
      const reviewer = await signedIn('pia');
      const text = `Said while live updates were off, ${Date.now()}`;
      const body = { type: 'doc', content: [{ type: 'paragraph', content: [{ type: 'text', text }] }] };
      const key = crypto.randomUUID();
      const posted = await reviewer.call(
        'POST',
        `/api/v1/workspaces/${slug}/revisions/${mould.latestRevisionId}/threads`,
        { clientKey: key, body },
        { 'idempotency-key': key },
      );
      expect(posted.status, JSON.stringify(posted.body)).toBeLessThan(300);
      await approver.page.getByText(text).first().waitFor({ timeout: 60_000 });
      await reviewer.context.close();
    } finally {
      await startService('realtime');
    }
    await approver.page.getByText('Live updates are off').waitFor({ state: 'detached', timeout: 90_000 });
    await approver.context.close();
  });
});

describe('without WebGL', () => {
  it('shows a drawn picture and the figures', async () => {
    const approver = await signedIn('anselm');
    await approver.context.addInitScript(() => {
      HTMLCanvasElement.prototype.getContext = (() => null) as typeof HTMLCanvasElement.prototype.getContext;
    });
    const { slug } = workspaceOf(approver, 'Quillon');
    const list = await approver.call('GET', `/api/v1/workspaces/${slug}/templates?limit=100`);
    const tray = (list.body.items as { id: string; number: string }[]).find((t) => t.number === 'QP-001')!;
    await approver.page.goto(`/w/${slug}/templates/${tray.id}/B`, { waitUntil: 'networkidle' });
    const picture = approver.page.locator('img[src*="picture"]').first();
    await picture.waitFor();
    expect(await picture.evaluate((image: HTMLImageElement) => image.naturalWidth)).toBeGreaterThan(300);
    await approver.page.getByRole('table').first().waitFor();
    await approver.context.close();
  });
});

describe('another client', () => {
  it('learns nothing: pages, API and files of the other workspace do not exist', async () => {
    const ines = await signedIn('ines');
    const mara = await signedIn('mara');
    const { slug } = workspaceOf(mara, 'Quillon');
    const list = await mara.call('GET', `/api/v1/workspaces/${slug}/templates`);
    const template = list.body.items[0] as { id: string; latestRevisionId: string };
    const own = workspaceOf(ines, 'Tamsin').slug;
    for (const path of [
      `/api/v1/workspaces/${slug}/templates`,
      `/api/v1/workspaces/${slug}/revisions/${template.latestRevisionId}`,
      `/api/v1/workspaces/${own}/revisions/${template.latestRevisionId}`,
      `/api/v1/workspaces/${own}/revisions/${template.latestRevisionId}/mesh`,
      `/api/v1/workspaces/${own}/templates/${template.id}`,
    ]) {
      const foreign = await ines.call('GET', path);
      const missing = await ines.call(
        'GET',
        path
          .replaceAll(/[0-9a-f]{8}-[0-9a-f-]{27}/g, '01890000-0000-7000-8000-000000000000')
          .replace(slug, 'no-such-room'),
      );
      expect(foreign.status, path).toBe(404);
      expect({ ...foreign.body, reference: '' }).toEqual({ ...missing.body, reference: '' });
    }
    const page = await ines.page.goto(`/w/${slug}`);
    expect(page!.status()).toBe(404);
    expect(await ines.page.content()).not.toMatch(/Quillon/);
    await ines.context.close();
    await mara.context.close();
  });
});

describe('a double click', () => {
  it('posts one revision', async () => {
    const designer = await signedIn('mara');
    const { api, id, path } = await newTemplate(designer, 'Clicked twice');
    await designer.page.goto(`${path}/post`);
    await designer.page
      .locator('input[type=file]')
      .setInputFiles(stl('cover.stl', await giftCover({ lipMm: 0, draftDeg: 9 })));
    await designer.page.getByText('SHA-256').waitFor();
    await designer.page.getByRole('button', { name: 'Post revision A' }).dblclick();
    await designer.page.waitForURL(/\/A$/);
    const { body } = await designer.call('GET', `${api}/templates/${id}/revisions`);
    expect(body as unknown[]).toHaveLength(1);
    await designer.context.close();
  });
});
