import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { type WorkspaceContext } from '@/lib/auth/context';
import { changeTemplate } from '@/lib/review/change-template';
import { createTemplate } from '@/lib/review/create-template';
import { viewTemplate } from '@/lib/review/view-template';
import { dayIn } from '@/lib/time/day-in';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { entries } from '@/tests/support/factory';
import { makeHouse, type House } from '@/tests/support/make-house';
import { refusedIn } from '@/tests/support/refused';

let database: FreshDatabase;
let house: House;
let designer: WorkspaceContext;
let lead: WorkspaceContext;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
});
beforeEach(async () => {
  [designer, lead] = await Promise.all([house.enter('designer'), house.enter('lead')]);
});

const refused = refusedIn(() => ({ database, house }));

describe('templates', () => {
  it('carry the workspace’s code and the next serial, and are on the chain', async () => {
    const made = await createTemplate(lead, { title: '  Lid for cups ', dueOn: '2027-03-01' });
    expect(made).toMatchObject({
      number: `${house.workspace.code}-001`,
      title: 'Lid for cups',
      dueOn: '2027-03-01',
      standing: 'draft',
      latestLetter: null,
      verdict: null,
      openMustSettle: 0,
      version: 1,
    });
    const [entry] = await entries(database, house.workspace.id, 1);
    expect(entry).toMatchObject({ action: 'template.created', subject_id: made.id });
    expect((await createTemplate(lead, { title: 'Next' })).number).toBe(`${house.workspace.code}-002`);
  });

  it.each([
    [{ title: '' }, '/title'],
    [{ title: 'T'.repeat(81) }, '/title'],
    [{ title: 'x', dueOn: '2026-01-31' }, '/dueOn'],
    [{ title: 'x', dueOn: '2027-02-30' }, '/dueOn'],
    [{ title: 7 }, '/title'],
  ])('refuse %j', async (input, pointer) => {
    await refused(() => createTemplate(lead, input), { code: 'invalid', errors: [{ pointer }] });
  });

  it('keep a long title whole and take a day that has only begun', async () => {
    const title = 'Blister tray for twelve ampoules, left-hand cavity, with snap rim and label step';
    expect(title).toHaveLength(80);
    const today = dayIn(lead.person.timeZone);
    expect(await createTemplate(lead, { title, dueOn: today })).toMatchObject({ title, dueOn: today });
  });

  it('change at the version that was seen, else not at all', async () => {
    const { id, version } = await createTemplate(lead, { title: 'Before' });
    const changed = await changeTemplate(designer, id, { title: 'After', dueOn: '2027-05-05', version });
    expect(changed).toMatchObject({ title: 'After', dueOn: '2027-05-05', version: version + 1 });
    await refused(() => changeTemplate(lead, id, { title: 'Other', version }), {
      code: 'precondition_failed',
      reason: 'changed-meanwhile',
    });
    expect((await viewTemplate(lead, id)).title).toBe('After');
  });
});
