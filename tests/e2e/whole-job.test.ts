import { createHash } from 'node:crypto';
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import JSZip from 'jszip';
import { Client } from 'pg';
import { describe, expect, inject, it } from 'vitest';
import { tartTray } from '@/db/seed/templates';
import { axeFindings } from '../support/axe';
import { screenshot } from '../support/browser';
import { outFolder } from '../support/out-folder';
import { signedIn, workspaceOf } from '../support/people';
import { mailTo } from '../support/product';

const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');

async function fileOf(name: string, bytes: Uint8Array): Promise<string> {
  mkdirSync(outFolder, { recursive: true });
  const file = path.join(outFolder, name);
  writeFileSync(file, bytes);
  return file;
}

describe('the whole job', () => {
  it('goes from a posted mesh to a released pack, with three people in three browsers', async () => {
    const designer = await signedIn('mara');
    const approver = await signedIn('anselm');
    const producer = await signedIn('jun');
    const lead = await signedIn('lewin');
    const { slug } = workspaceOf(designer, 'Quillon');
    const api = `/api/v1/workspaces/${slug}`;
    const failing = await tartTray({ draftDeg: 1.5, ventMm: 1 });
    const sound = await tartTray({ draftDeg: 9, ventMm: 1 });

    // What the designer's browser is told over the socket, so that a note shown by mere polling does not count as live.
    const told: string[] = [];
    designer.page.on('websocket', (socket) =>
      socket.on('framereceived', ({ payload }) => told.push(String(payload))),
    );

    // The designer opens a template and posts a revision that will lock on the template.
    await designer.page.goto(`/w/${slug}`);
    await designer.page.getByRole('button', { name: 'New template' }).click();
    await designer.page.getByLabel('Title').fill('Petit four tray');
    await designer.page.getByRole('button', { name: 'Open template' }).click();
    await designer.page.waitForURL(/\/post$/);
    const templatePath = new URL(designer.page.url()).pathname.replace(/\/post$/, '');
    const templateId = templatePath.split('/').at(-1)!;
    await designer.page.locator('input[type=file]').setInputFiles(await fileOf('petit-four-a.stl', failing));
    await designer.page.getByText('SHA-256').waitFor();
    await designer.page.getByLabel('What to look at').fill('The cups are steep on purpose.');
    await screenshot(designer.page, 'post');
    const post = designer.page.getByRole('button', { name: 'Post revision A' });
    await post.dblclick();
    await designer.page.waitForURL(/\/A$/);

    // The finding reaches the approver's open page without a reload.
    await approver.page.goto(`${templatePath}/A`);
    const finding = approver.page.getByText(/grips the template/).first();
    await finding.waitFor();
    const revisions = await designer.call('GET', `${api}/templates/${templateId}/revisions`);
    expect(revisions.body.map((r: { letter: string }) => r.letter)).toEqual(['A']);
    const warned = await mailTo(
      'mara@larkfield.example',
      (mail) => /Petit four tray/.test(mail.subject) && /will not form as it is/.test(mail.subject),
    );
    expect(warned.text).toContain('Draft');

    // A note and its answer appear to the other within a second, without a reload.
    await designer.page
      .getByText(/grips the template/)
      .first()
      .waitFor();
    await approver.page.getByRole('button', { name: 'Add a note' }).click();
    await approver.page
      .getByRole('textbox', { name: 'New note' })
      .fill('Could the foot be rounder without losing the crisp rim?');
    await approver.page.getByRole('checkbox', { name: /settled/i }).check({ force: true });
    await designer.page.getByText('Live', { exact: true }).waitFor();
    const toldBefore = told.length;
    const noteSent = performance.now();
    await approver.page.getByRole('button', { name: 'Post the note' }).click();
    await designer.page.getByText('Could the foot be rounder').first().waitFor();
    const liveMs = performance.now() - noteSent;
    expect(told.slice(toldBefore).some((frame) => frame.includes('docket.changed'))).toBe(true);
    // Events carry ids only: never a word of what was written.
    expect(told.some((frame) => frame.includes('crisp rim'))).toBe(false);
    const noteOnDesigners = designer.page.locator('li', { hasText: 'Could the foot be rounder' }).first();
    await noteOnDesigners.getByRole('button', { name: 'reply' }).click();
    await designer.page
      .getByRole('textbox', { name: /^Reply to/ })
      .fill('Yes, with 9° of draft. I post that as B.');
    await designer.page.getByRole('button', { name: 'Post the reply' }).click();
    await approver.page.getByText('Yes, with 9° of draft').first().waitFor();
    process.stdout.write(`  note posted and shown in the other browser after ${Math.round(liveMs)} ms\n`);

    // B carries the open note over.
    await designer.page.goto(`${templatePath}/post`);
    await designer.page.locator('input[type=file]').setInputFiles(await fileOf('petit-four-b.stl', sound));
    await designer.page.getByText('SHA-256').waitFor();
    await designer.page.getByRole('button', { name: 'Post revision B' }).click();
    await designer.page.waitForURL(/\/B$/);
    await designer.page.getByText('Could the foot be rounder').first().waitFor();
    await approver.page.goto(`${templatePath}/B`);
    const carried = approver.page.locator('li', { hasText: 'Could the foot be rounder' }).first();
    await carried.getByRole('button', { name: 'settle' }).click();

    // Forming passes by itself; the designer wrote it and cannot sign; the lead signs for the studio.
    const list = await designer.call('GET', `${api}/templates/${templateId}/revisions`);
    const items = list.body as { id: string; letter: string }[];
    const revisionId = items.find(({ letter }) => letter === 'B')!.id;
    await lead.page.goto(`${templatePath}/B`);
    const signStudio = lead.page.getByRole('button', { name: /^Sign for the studio/ });
    await signStudio.waitFor({ timeout: 90_000 });
    expect(await designer.page.getByRole('button', { name: /^Sign for/ }).count()).toBe(0);
    await signStudio.click();
    await lead.page.getByLabel('Your password').fill('not the right one');
    await lead.page.getByRole('button', { name: /^Sign as/ }).click();
    await lead.page
      .getByText(/not your password/)
      .first()
      .waitFor();
    await lead.page.getByLabel('Your password').fill(lead.password);
    await lead.page.getByRole('button', { name: /^Sign as/ }).click();

    const signClient = approver.page.getByRole('button', { name: /^Sign for the client/ });
    await signClient.waitFor();
    await signClient.click();
    await approver.page.getByRole('dialog').getByText(sha256(sound).slice(0, 4)).first().waitFor();
    expect(await axeFindings(approver.page)).toEqual([]);
    await screenshot(approver.page, 'sign');
    await approver.page.getByLabel('Your password').fill(approver.password);
    await approver.page.getByRole('button', { name: /^Sign as/ }).click();
    await approver.page.getByText(/^Agreed by/).waitFor();

    // Locked: page, API and database refuse.
    const locked = await designer.call('GET', `${api}/revisions/${revisionId}`);
    expect(locked.body).toMatchObject({ state: 'approved', can: { waive: false } });
    expect(locked.body.contentDigest).toMatch(/^[0-9a-f]{64}$/);
    expect(await approver.page.getByRole('button', { name: /^Sign for/ }).count()).toBe(0);
    const gate = locked.body.gates.at(-1) as { id: string };
    const again = await approver.call(
      'POST',
      `${api}/gates/${gate.id}/sign`,
      { digest: locked.body.contentDigest, password: approver.password },
      { 'idempotency-key': 'sign-once-more' },
    );
    expect(again.status).toBe(409);
    const withdrawn = await designer.call('POST', `${api}/revisions/${revisionId}/withdraw`, {
      reason: 'a change of mind',
    });
    expect(withdrawn.status).toBe(409);
    const database = new Client({ connectionString: inject('product').adminUrl });
    await database.connect();
    try {
      const refused = (statement: string) =>
        expect(database.query(statement, [revisionId])).rejects.toThrow(/frozen|locked/);
      await refused(`update revisions set note = 'another' where id = $1`);
      await refused(
        `update recipes set digest = 'x' where id = (select recipe_id from revisions where id = $1)`,
      );
      await refused(
        `update meshes set sha256 = 'x' where id = (select mesh_id from revisions where id = $1)`,
      );
      await refused(`update signatures set printed_name = 'Somebody' where revision_id = $1`);
      await refused(`update locks set content_digest = 'x' where revision_id = $1`);
      await refused(`delete from findings where revision_id = $1`);
    } finally {
      await database.end();
    }

    // The producer releases; the pack holds the very bytes and verifies.
    await producer.page.goto(`${templatePath}/B`);
    await producer.page.getByRole('button', { name: /^Release to production/ }).click();
    expect(await axeFindings(producer.page)).toEqual([]);
    await producer.page.getByLabel('Note to production').fill('One copy, sanded.');
    await producer.page
      .getByRole('dialog')
      .getByRole('button', { name: /release/i })
      .click();
    const download = producer.page.getByRole('link', { name: /^Download the pack/ });
    await download.first().waitFor({ timeout: 90_000 });
    await screenshot(producer.page, 'released');
    const [file] = await Promise.all([producer.page.waitForEvent('download'), download.first().click()]);
    const zip = await JSZip.loadAsync(readFileSync(await file.path()));
    const sums = (await zip.file('SHA256SUMS')!.async('string')).trim().split('\n');
    expect(sums.length).toBeGreaterThanOrEqual(6);
    for (const line of sums) {
      const [, sum, name] = /^([0-9a-f]{64}) [ *](.+)$/.exec(line)!;
      expect(sha256(await zip.file(name)!.async('uint8array')), name).toBe(sum);
    }
    const mesh = Object.keys(zip.files).find((name) => name.endsWith('.stl'))!;
    expect(Buffer.from(await zip.file(mesh)!.async('uint8array')).equals(Buffer.from(sound))).toBe(true);
    const content = await zip.file('content.json')!.async('uint8array');
    expect(sha256(content)).toBe(locked.body.contentDigest);
    const signatures = JSON.parse(await zip.file('signatures.json')!.async('string')) as unknown;
    expect(JSON.stringify(signatures)).toMatch(/Anselm Brandt/);
    expect((await zip.file('certificate.pdf')!.async('string')).slice(0, 5)).toBe('%PDF-');

    // The people concerned read of it.
    const signed = await mailTo(
      'mara@larkfield.example',
      (mail) => /Petit four tray/.test(mail.subject) && /is approved and locked/.test(mail.subject),
    );
    expect(signed.text).toMatch(/Anselm Brandt, approver/);
    expect(signed.text.replace(/\s+/g, ' ')).toContain('I agree to this revision for the client');
    const released = await mailTo(
      'anselm@quillon.example',
      (mail) => /released/i.test(mail.subject) && /Petit four tray/.test(mail.subject),
    );
    expect(released.html).not.toMatch(/X-Amz-Signature/);

    for (const person of [designer, approver, producer, lead]) await person.context.close();
  });
});
