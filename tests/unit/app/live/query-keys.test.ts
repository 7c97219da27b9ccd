import { describe, expect, it } from 'vitest';
import { queryKeys, staleAfter } from '@/app/_components/live/query-keys';
import { liveEventNames, readLiveEvent } from '@/realtime/events';

const id = '0192f1c4-0000-7000-8000-000000000001';
const other = '0192f1c4-0000-7000-8000-000000000002';

const samples: Record<(typeof liveEventNames)[number], unknown> = {
  'template.changed': { id },
  'draft.changed': { id, templateId: other },
  'upload.changed': { id, templateId: other },
  'revision.changed': { id, templateId: other },
  'docket.changed': { revisionId: id },
  'job.progressed': { id, subjectId: other, stage: 'measuring draft', progress: 0.4 },
  'people.changed': { id },
  'gate-plan.changed': { id, version: 2 },
  'today.changed': { id },
};

describe('what a live event makes stale', () => {
  it.each(liveEventNames)('%s names something to fetch again, or only carries progress', (name) => {
    const event = readLiveEvent(name, samples[name]);
    expect(event).not.toBeNull();
    expect(staleAfter('w', event!).length > 0).toBe(name !== 'job.progressed');
  });

  it('fetches the revision too when its docket changed: the digest that is signed moves with it', () => {
    const keys = staleAfter('w', { name: 'docket.changed', data: { revisionId: id } });
    expect(keys).toContainEqual(queryKeys.docket('w', id));
    expect(keys).toContainEqual(queryKeys.revision('w', id));
    expect(keys).toContainEqual(queryKeys.content('w', id));
  });

  it('keeps keys of one workspace below that workspace, so that a reconnect can ask for all of them', () => {
    const root = queryKeys.workspace('w');
    for (const name of liveEventNames.filter((n) => n !== 'today.changed')) {
      for (const key of staleAfter('w', readLiveEvent(name, samples[name])!)) {
        expect(key.slice(0, root.length)).toEqual(root);
      }
    }
  });

  it('touches no workspace on a page that shows none', () => {
    expect(staleAfter(null, { name: 'docket.changed', data: { revisionId: id } })).toEqual([]);
    expect(staleAfter(null, { name: 'today.changed', data: { id } })).toEqual([queryKeys.today()]);
  });
});

describe('readLiveEvent', () => {
  it.each([
    ['an unknown name', 'revision.deleted', { id }],
    ['an event of the protocol', 'pusher:subscription_succeeded', {}],
    ['an id that is none', 'people.changed', { id: 'me' }],
    ['no data', 'docket.changed', undefined],
    ['a property of every object', 'toString', { id }],
    ['a word too long', 'job.progressed', { id, subjectId: id, stage: 'x'.repeat(61), progress: 0 }],
    ['progress beyond the end', 'job.progressed', { id, subjectId: id, stage: 'x', progress: 2 }],
  ])('drops %s', (_what, name, data) => {
    expect(readLiveEvent(name, data)).toBeNull();
  });

  it('leaves out what the event does not carry, and keeps what it may', () => {
    const data = { id, templateId: other, version: 3, note: 'words' };
    expect(readLiveEvent('revision.changed', data)).toEqual({
      name: 'revision.changed',
      data: { id, templateId: other, version: 3 },
    });
  });
});
