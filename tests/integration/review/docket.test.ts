import { randomUUID } from 'node:crypto';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { personContext, type WorkspaceContext } from '@/lib/auth/context';
import { enterWorkspace } from '@/lib/auth/enter';
import { listActivity } from '@/lib/review/list-activity';
import { entryHash, genesis, type ChainedEntry } from '@/lib/audit/chain';
import { actionsAbout } from '@/lib/review/activity-topics';
import { knownActions } from '@/lib/review/activity-words';
import { csvLine, exportActivity } from '@/lib/review/export-activity';
import { ExportActivityInput } from '@/lib/review/schemas';
import { openDraft } from '@/lib/review/open-draft';
import { openThread } from '@/lib/review/open-thread';
import { replyToThread } from '@/lib/review/reply-to-thread';
import { saveDraft } from '@/lib/review/save-draft';
import { settleThread } from '@/lib/review/settle-thread';
import { viewDocket } from '@/lib/review/view-docket';
import { viewToday } from '@/lib/review/view-today';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import {
  approved,
  entries,
  mailsOf,
  newTemplate,
  note,
  postChecked,
  raise,
  sign,
} from '@/tests/support/factory';
import { makeHouse, type House } from '@/tests/support/make-house';
import { refusedIn } from '@/tests/support/refused';
import { createWorkspace } from '@/lib/workspaces/create-workspace';

let database: FreshDatabase;
let house: House;
let stranger: House;
let designer: WorkspaceContext;
let lead: WorkspaceContext;
let reviewer: WorkspaceContext;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  stranger = await makeHouse(database);
});
beforeEach(async () => {
  [designer, lead, reviewer] = await Promise.all([
    house.enter('designer'),
    house.enter('lead'),
    house.enter('reviewer'),
  ]);
});

const refused = refusedIn(() => ({ database, house }));

const mailsFor = async (revisionId: string, text: string) => {
  const all = await mailsOf(database, house.workspace.id, 'note-posted');
  return all
    .filter(({ payload }) => payload.text === text)
    .map(({ person, payload }) => [person, payload.mentioned]);
};

describe('notes', () => {
  it('open a thread where it was pinned, tell the author, and stand on the chain', async () => {
    const { revisionId } = await postChecked(house);
    const pin = {
      at: [1.5, -2, 20],
      normal: [0, 0, 1],
      view: { position: [0, -90, 60], target: [0, 0, 10], up: [0, 0, 1] },
    };
    const thread = await raise(reviewer, revisionId, 'This edge cuts.', { pin, mustSettle: true });
    expect(thread).toMatchObject({
      openedOn: 'A',
      openedByName: reviewer.person.name,
      mustSettle: true,
      afterApproval: false,
      state: 'open',
      pin,
      standing: 'placed',
      notes: [{ authorId: reviewer.person.id, text: 'This edge cuts.' }],
    });
    expect(await mailsFor(revisionId, 'This edge cuts.')).toEqual([[designer.person.id, false]]);
    const [entry] = await entries(database, house.workspace.id, 1);
    expect(entry).toMatchObject({ action: 'thread.opened', subject_id: thread.id });
    const { rows } = await database.query<{ payload: { channel: string; name: string; data: unknown } }>(
      "select payload from outbox where kind = 'live' and payload->>'name' = 'docket.changed' order by created_at desc limit 1",
    );
    expect(rows[0].payload).toEqual({
      channel: `private-workspace-${house.workspace.id}`,
      name: 'docket.changed',
      data: { revisionId, threadId: thread.id },
    });
    const { counts } = await viewDocket(lead, revisionId);
    expect(counts.mustSettle).toBe(1);
  });

  it('tell those who spoke and those who are named, never the writer; names are the server’s', async () => {
    const { revisionId } = await postChecked(house);
    const thread = await raise(reviewer, revisionId, 'Where is the vent?');
    await replyToThread(designer, thread.id, note('Under the rim.'));
    expect(await mailsFor(revisionId, 'Under the rim.')).toEqual([[reviewer.person.id, false]]);
    const said = note('Please look ', { id: lead.person.id, name: 'The wrong name' });
    const answered = await replyToThread(reviewer, thread.id, said);
    const text = `Please look @${lead.person.name}`;
    expect(answered.notes.at(-1)?.text).toBe(text);
    expect(JSON.stringify(answered.notes.at(-1)?.body)).not.toContain('The wrong name');
    expect(new Map((await mailsFor(revisionId, text)) as [string, boolean][])).toEqual(
      new Map([
        [designer.person.id, false],
        [lead.person.id, true],
      ]),
    );
  });

  it('never name, mail or show a person of another workspace', async () => {
    const { revisionId } = await postChecked(house);
    const foreign = stranger.people.lead.person;
    await refused(() => openThread(reviewer, revisionId, note('Hello ', foreign)), {
      code: 'invalid',
      errors: [{ pointer: '/body' }],
    });
    await refused(() => openThread(reviewer, revisionId, note('Hello ', { id: randomUUID(), name: 'x' })), {
      code: 'invalid',
    });
  });

  it('hold nothing but a note', async () => {
    const { revisionId } = await postChecked(house);
    const body = (href: string) => ({
      type: 'doc',
      content: [
        {
          type: 'paragraph',
          content: [{ type: 'text', text: 'x', marks: [{ type: 'link', attrs: { href } }] }],
        },
      ],
    });
    for (const bad of [
      { clientKey: randomUUID(), body: body('javascript:alert(1)') },
      { clientKey: randomUUID(), body: { type: 'doc', content: [] } },
      { clientKey: 'no key', body: body('https://example.org') },
      { clientKey: randomUUID() },
      { ...note('x'), pin: { at: [1, 2], normal: [0, 0, 1], view: null } },
    ])
      await refused(() => openThread(reviewer, revisionId, bad), { code: 'invalid' });
  });

  it('answer a finding in one thread', async () => {
    const { revisionId } = await postChecked(house, { statuses: { draft: 'caution' } });
    const finding = (await viewDocket(lead, revisionId)).findings.find(({ status }) => status === 'caution')!;
    const thread = await raise(lead, revisionId, 'It will do.', { findingId: finding.id });
    expect((await viewDocket(lead, revisionId)).findings.find(({ id }) => id === finding.id)?.threadId).toBe(
      thread.id,
    );
    await refused(() => openThread(reviewer, revisionId, { ...note('Will it?'), findingId: finding.id }), {
      reason: 'already-answered',
    });
    const other = await postChecked(house);
    await refused(() => openThread(lead, other.revisionId, { ...note('x'), findingId: finding.id }), {
      code: 'not_found',
    });
  });

  it('go where they are seen: not onto a closed revision that another has followed', async () => {
    const a = await postChecked(house);
    const thread = await raise(lead, a.revisionId, 'On A.');
    await postChecked(house, { templateId: a.templateId });
    await refused(() => openThread(lead, a.revisionId, note('Too late.')), { reason: 'not-current' });
    await replyToThread(designer, thread.id, note('On B now.'));
    const { rows } = await database.query<{ letter: string }>(
      'select r.letter from notes n join revisions r on r.id = n.revision_id where n.thread_id = $1 order by n.created_at',
      [thread.id],
    );
    expect(rows.map(({ letter }) => letter)).toEqual(['A', 'B']);
  });
});

describe('settling', () => {
  it('is by name, can be undone, and what was opened again travels to the revision in review', async () => {
    const a = await postChecked(house);
    const thread = await raise(reviewer, a.revisionId, 'Too sharp.', { mustSettle: true });
    const settled = await settleThread(designer, thread.id, { settled: true, version: thread.version });
    expect(settled).toMatchObject({ state: 'settled', settledByName: designer.person.name });
    expect(settled.settledAt).not.toBeNull();
    const b = await postChecked(house, { templateId: a.templateId });
    expect((await viewDocket(lead, b.revisionId)).threads).toEqual([]);
    await settleThread(reviewer, thread.id, { settled: false, version: settled.version });
    const docket = await viewDocket(lead, b.revisionId);
    expect(docket.threads).toMatchObject([
      { id: thread.id, state: 'open', openedOn: 'A', settledByName: null },
    ]);
    expect(docket.counts.mustSettle).toBe(1);
    expect((await entries(database, house.workspace.id, 1))[0].action).toBe('thread.reopened');
  });
});

describe('Today', () => {
  const today = (ctx: WorkspaceContext) => viewToday(personContext(ctx.person));
  const about = async (ctx: WorkspaceContext, templateId: string) =>
    (await today(ctx)).items
      .filter(({ path }) => path.includes(templateId))
      .map(({ kind, text }) => [kind, text]);

  it('says what waits on each person, and no more once it is done', async () => {
    const templateId = await newTemplate(designer);
    const { recipe, version } = await openDraft(designer, templateId);
    expect(await about(designer, templateId)).toEqual([]);
    await saveDraft(designer, templateId, { uploadId: null, recipe, note: 'Begun.', version });
    expect(await about(designer, templateId)).toEqual([['draft', 'Your draft is not posted yet']]);
    expect(await about(lead, templateId)).toEqual([]);

    const a = await postChecked(house, { templateId, statuses: { draft: 'fail', undercut: 'fail' } });
    expect(await about(designer, templateId)).toEqual([
      ['fix', '2 checks fail on revision A; post the next one or have it waived'],
    ]);
    expect(await about(lead, templateId)).toEqual([]);

    const b = await postChecked(house, { templateId });
    expect(await about(designer, templateId)).toEqual([]);
    expect(await about(lead, templateId)).toEqual([['sign', 'Revision B waits for your name at Studio']]);

    const thread = await raise(reviewer, b.revisionId, 'Must change.', { mustSettle: true });
    expect(await about(lead, templateId)).toEqual([]);
    expect(await about(designer, templateId)).toEqual([['settle', 'One item must be settled on revision B']]);
    expect(await about(reviewer, templateId)).toEqual([['settle', 'One item must be settled on revision B']]);
    await replyToThread(designer, thread.id, note('What do you say, ', lead.person));
    expect((await about(lead, templateId)).map(([kind]) => kind)).toEqual(['mention']);
    await replyToThread(reviewer, thread.id, note('I wait too.'));
    expect((await about(lead, templateId)).map(([kind]) => kind)).toEqual(['mention']);
    await replyToThread(lead, thread.id, note('Fine by me.'));
    expect(await about(lead, templateId)).toEqual([]);
    await settleThread(reviewer, thread.id, { settled: true, version: thread.version });

    await sign(lead, b.revisionId);
    const approver = await house.enter('approver');
    expect(await about(approver, templateId)).toEqual([['sign', 'Revision B waits for your name at Client']]);
    await sign(approver, b.revisionId);
    expect(await about(approver, templateId)).toEqual([]);
    const producer = await house.enter('producer');
    expect(await about(producer, templateId)).toEqual([
      ['release', 'Revision B is approved and can be released'],
    ]);
    expect(a.templateId).toBe(templateId);
  });

  it('spans the workspaces of a person and nothing else', async () => {
    const second = await createWorkspace(await house.enterStudio('lead'), {
      name: 'Second client',
      code: 'SC',
    });
    const there = await enterWorkspace(house.people.designer.person, second.id);
    const templateId = await newTemplate(there);
    const { recipe, version } = await openDraft(there, templateId);
    await saveDraft(there, templateId, { uploadId: null, recipe, note: 'Begun.', version });
    const mine = (await today(designer)).items.map(({ workspace }) => workspace.name);
    expect(mine).toContain('Second client');
    const clients = await today(reviewer);
    expect(JSON.stringify(clients)).not.toContain('Second client');
    expect(await today(await stranger.enter('lead'))).toMatchObject({ items: [] });
    expect(JSON.stringify(await today(await stranger.enter('lead')))).not.toContain(house.workspace.code);
    expect(clients.recent.length).toBeGreaterThan(5);
    const since = (await today(designer)).items.map((item) => item.since);
    expect(since).toEqual([...since].sort());
  });
});

describe('activity', () => {
  it('narrows to a topic and to a person; each action belongs to a topic', async () => {
    const topics = ['agreement', 'revisions', 'docket', 'people'] as const;
    expect([...new Set(topics.flatMap(actionsAbout))].sort()).toEqual([...knownActions].sort());
    const { revisionId } = await postChecked(house);
    await raise(reviewer, revisionId, 'Is the rim round enough?');
    await approved(house);
    const all = (await listActivity(reviewer, { limit: 100 })).items;
    for (const about of topics) {
      const { items } = await listActivity(reviewer, { about, limit: 100 });
      expect(items.length).toBeGreaterThan(0);
      expect(items.every(({ action }) => actionsAbout(about).includes(action))).toBe(true);
    }
    const [{ actorId }] = all;
    const { items } = await listActivity(reviewer, { by: actorId!, limit: 100 });
    const theirs = all.filter((entry) => entry.actorId === actorId);
    expect(items.slice(0, theirs.length)).toEqual(theirs);
    expect(items.every((entry) => entry.actorId === actorId)).toBe(true);
    await expect(listActivity(reviewer, { about: 'weather' })).rejects.toMatchObject({ code: 'invalid' });
  });

  it('is saved whole: in words as CSV, and with all that its hashes are made of', async () => {
    const read = async (format: string) => {
      const file = await exportActivity(reviewer, ExportActivityInput.parse({ format }));
      expect(file.fileName).toMatch(new RegExp(`^${house.workspace.slug}-activity-to-\\d+\\.${format}$`));
      return new Response(file.body).text();
    };
    const record = JSON.parse(await read('json')) as {
      workspace: { id: string };
      head: { seq: number; hash: string };
      entries: (Omit<ChainedEntry, 'workspaceId'> & { previous: string; hash: string })[];
    };
    let previous = genesis;
    for (const { previous: before, hash, ...entry } of record.entries) {
      expect(before).toBe(previous);
      previous = entryHash(before, { ...entry, workspaceId: record.workspace.id });
      expect(hash).toBe(previous);
    }
    expect(record.head).toEqual({ seq: record.entries.length, hash: previous });
    const lines = (await read('csv')).trimEnd().split('\r\n');
    expect(lines).toHaveLength(record.entries.length + 1);
    expect(lines[0]).toBe('entry,time (UTC),who,what,action,hash');
    expect(lines.at(-1)).toContain(record.head.hash);
    expect(csvLine(['=1+1', 'say "a"', '-2', 'plain'])).toBe(`'=1+1,"say ""a""",'-2,plain\r\n`);
  });

  it('tells every entry of the chain in words, page by page, without gap or repeat', async () => {
    await approved(house);
    const seen: number[] = [];
    let cursor: string | undefined;
    do {
      const page = await listActivity(reviewer, { cursor, limit: 7 });
      for (const item of page.items) {
        expect(item.text).not.toMatch(/undefined|null|\[object|a template|\?$/);
        expect(knownActions).toContain(item.action);
        expect(item.path).toMatch(new RegExp(`^/w/${house.workspace.slug}(/|$)`));
      }
      seen.push(...page.items.map(({ seq }) => seq));
      cursor = page.nextCursor ?? undefined;
    } while (cursor);
    const { rows } = await database.query<{ seq: number }>(
      'select seq from audit_heads where workspace_id = $1',
      [house.workspace.id],
    );
    expect(seen).toEqual(Array.from({ length: rows[0].seq }, (_, i) => rows[0].seq - i));
    await expect(listActivity(reviewer, { cursor: 'nonsense' })).rejects.toMatchObject({
      code: 'invalid',
      errors: [{ pointer: '/cursor' }],
    });
  });
});
