import { readFile } from 'node:fs/promises';
import { Client } from 'pg';
import { beforeAll, expect, it } from 'vitest';
import type { WorkspaceContext } from '@/lib/auth/context';
import { listTemplates } from '@/lib/review/list-templates';
import { viewTemplate } from '@/lib/review/view-template';
import { withdrawRevision } from '@/lib/review/withdraw-revision';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { approved, post, postChecked } from '@/tests/support/factory';
import { makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
let designer: WorkspaceContext;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  designer = await house.enter('designer');
});

const found = async (standing: string, templateId: string) =>
  (await listTemplates(designer, { standing })).items.find(({ id }) => id === templateId);

it('stands on the approved revision while a later one is in review, and after that one is withdrawn', async () => {
  const a = await approved(house);
  const b = await postChecked(house, { templateId: a.templateId, statuses: { draft: 'fail' } });
  const stands = { standing: 'approved', standingLetter: 'A', standingRevisionId: a.revisionId };
  expect(await viewTemplate(designer, a.templateId)).toMatchObject({
    ...stands,
    ahead: { id: b.revisionId, letter: 'B', standing: 'in_review' },
    latestLetter: 'B',
    verdict: 'pass',
    openMustSettle: 1,
  });
  expect(await found('approved', a.templateId)).toMatchObject(stands);
  expect(await found('in_review', a.templateId)).toMatchObject(stands);

  await withdrawRevision(designer, b.revisionId, { reason: 'Wrong file.' });
  expect(await viewTemplate(designer, a.templateId)).toMatchObject({
    ...stands,
    ahead: null,
    latestLetter: 'B',
    openMustSettle: 0,
  });
  expect(await found('approved', a.templateId)).toMatchObject(stands);
  expect(await found('in_review', a.templateId)).toBeUndefined();
  expect(await found('withdrawn', a.templateId)).toBeUndefined();
});

it('is filled in for templates that were there before, by the role that migrates', async () => {
  const a = await approved(house);
  const b = await post(designer, a.templateId);
  await withdrawRevision(designer, b.revisionId, { reason: 'Wrong file.' });
  const lone = await post(designer);
  const columns = 'standing, standing_revision_id, standing_letter, latest_standing';
  const state = async () =>
    (
      await database.query(`select id, ${columns} from templates where workspace_id = $1 order by id`, [
        house.workspace.id,
      ])
    ).rows;
  const before = await state();
  // As the earlier version kept them: the newest revision's state and nothing else.
  await database.query(
    `update templates t set standing = r.state, standing_revision_id = null, standing_letter = null, latest_standing = null
     from revisions r where r.workspace_id = t.workspace_id and r.id = t.latest_revision_id`,
  );
  expect(await state()).not.toEqual(before);
  const sql = await readFile(
    new URL('../../../drizzle/0003_standing_of_templates.sql', import.meta.url),
    'utf8',
  );
  const client = new Client({ connectionString: database.ownerUrl });
  await client.connect();
  try {
    for (const statement of sql.split('--> statement-breakpoint'))
      if (!/add column/i.test(statement)) await client.query(statement);
  } finally {
    await client.end();
  }
  expect(await state()).toEqual(before);
  expect(before).toContainEqual(
    expect.objectContaining({ id: lone.templateId, standing: 'in_review', latest_standing: 'in_review' }),
  );
});
