import { describe, expect, it } from 'vitest';
import { ApiError } from '@/app/_components/api-client';
import { memoryStore } from '@/app/_components/note-editor/key-value-store';
import { maxFailures, NoteOutbox, type OutgoingNote } from '@/app/_components/note-editor/note-outbox';

const note = (clientKey: string, change: Partial<OutgoingNote> = {}): OutgoingNote => ({
  clientKey,
  personId: 'brandt',
  workspaceId: 'w',
  revisionId: 'r',
  threadId: null,
  findingId: null,
  pin: null,
  mustSettle: false,
  body: { type: 'doc', content: [] },
  draftKey: `draft-${clientKey}`,
  writtenAt: Number(clientKey.replace(/\D/g, '')) || 0,
  ...change,
});

type Answer = ApiError | undefined;

/** An outbox whose server answers by `answers`, one a send or by the note; a missing one means accepted. */
function desk(
  answers: Answer[] | ((note: OutgoingNote) => Answer) = [],
  personId = 'brandt',
  store = memoryStore(),
) {
  const sends: string[] = [];
  const refused: string[] = [];
  const takenBack: string[] = [];
  const outbox = new NoteOutbox(
    {
      store,
      send: async (sent) => {
        sends.push(sent.clientKey);
        const answer = typeof answers === 'function' ? answers(sent) : answers.shift();
        if (answer) throw answer;
      },
      onSent: () => {},
      onTakenBack: ({ clientKey }) => void takenBack.push(clientKey),
      onRefused: ({ clientKey }, error) => void refused.push(`${clientKey}: ${error.detail}`),
    },
    personId,
  );
  return { outbox, sends, refused, takenBack, store };
}

const noAnswer = () => new ApiError(0, 'No connection', 'nothing answered');
const problem = (status: number, reason: string, detail = reason) =>
  new ApiError(status, 'Refused', detail, [], null, null, reason);

describe('NoteOutbox', () => {
  it('sends a note once and forgets it when the server has it', async () => {
    const { outbox, sends, store } = desk();
    await outbox.add(note('k1'));
    await outbox.flush();
    expect(sends).toEqual(['k1']);
    expect(outbox.snapshot()).toEqual([]);
    expect(await store.entries()).toEqual([]);
  });

  it('keeps notes without a connection, in order, and sends each once when it is back', async () => {
    const { outbox, sends, store } = desk([noAnswer(), noAnswer()]);
    await outbox.add(note('k1'));
    await outbox.add(note('k2'));
    expect(outbox.snapshot().map((entry) => entry.state)).toEqual(['waiting', 'waiting']);
    expect(await store.entries()).toHaveLength(2);
    sends.length = 0;
    await outbox.flush();
    expect(sends).toEqual(['k1', 'k2']);
    expect(outbox.snapshot()).toEqual([]);
  });

  it('takes up after a reload what an earlier page left', async () => {
    const { outbox, store } = desk([noAnswer(), noAnswer()]);
    await outbox.add(note('k2'));
    await outbox.add(note('k1'));
    const later = desk([], 'brandt', store);
    await later.outbox.open();
    expect(later.sends).toEqual(['k1', 'k2']);
  });

  it('never sends what somebody else wrote in this browser', async () => {
    const { outbox, store } = desk([noAnswer()]);
    await outbox.add(note('k1'));
    const other = desk([], 'ferro', store);
    await other.outbox.open();
    expect(other.sends).toEqual([]);
    expect(await store.entries()).toHaveLength(1);
  });

  it('gives a refused note back with the reason, and goes on with the next', async () => {
    const { outbox, sends, refused } = desk([
      noAnswer(),
      noAnswer(),
      problem(409, 'revision-locked', 'This revision is locked.'),
    ]);
    await outbox.add(note('k1'));
    await outbox.add(note('k2'));
    sends.length = 0;
    await outbox.flush();
    expect(refused).toEqual(['k1: This revision is locked.']);
    expect(sends).toEqual(['k1', 'k2']);
    expect(outbox.snapshot()).toEqual([]);
  });

  it.each([
    ['an unwell server', problem(503, 'unavailable')],
    ['a crowd', problem(429, 'limit-exceeded')],
    ['the same note still in work', problem(409, 'still-running')],
  ])('waits for %s', async (_what, error) => {
    const { outbox, refused } = desk([error]);
    await outbox.add(note('k1'));
    expect(refused).toEqual([]);
    expect(outbox.snapshot()[0]?.state).toBe('waiting');
  });

  it('goes on past a note that the server fails on, and gives it back after some tries', async () => {
    const failure = problem(500, 'internal', 'Something went wrong.');
    const { outbox, sends, refused, store } = desk(({ clientKey }) =>
      clientKey === 'k1' ? failure : undefined,
    );
    await outbox.add(note('k1'));
    await outbox.add(note('k2'));
    expect(outbox.snapshot()).toMatchObject([{ clientKey: 'k1', state: 'stuck' }]);
    expect(sends).toContain('k2');
    for (let tries = sends.filter((key) => key === 'k1').length; tries < maxFailures; tries++) {
      expect(refused).toEqual([]);
      await outbox.flush();
    }
    expect(refused).toEqual(['k1: Something went wrong.']);
    expect(sends.filter((key) => key === 'k1')).toHaveLength(maxFailures);
    expect(outbox.snapshot()).toEqual([]);
    expect(await store.entries()).toEqual([]);
  });

  it('lets its writer take back a note that is stuck, and no other', async () => {
    const { outbox, takenBack, store } = desk([problem(500, 'internal'), noAnswer()]);
    await outbox.add(note('k1'));
    await outbox.takeBack('k1');
    expect(takenBack).toEqual(['k1']);
    expect(outbox.snapshot()).toEqual([]);
    expect(await store.entries()).toEqual([]);
    await outbox.add(note('k2'));
    await outbox.takeBack('k2');
    expect(takenBack).toEqual(['k1']);
    expect(outbox.snapshot()).toHaveLength(1);
  });

  it('holds notes while the session has ended', async () => {
    const { outbox, refused } = desk([problem(401, 'unauthenticated')]);
    await outbox.add(note('k1'));
    expect(outbox.snapshot()[0]?.state).toBe('signed-out');
    expect(refused).toEqual([]);
    await outbox.flush();
    expect(outbox.snapshot()).toEqual([]);
  });

  it('does not send a note twice when asked twice at once', async () => {
    const { outbox, sends } = desk();
    await Promise.all([outbox.add(note('k1')), outbox.flush(), outbox.flush()]);
    await outbox.flush();
    expect(sends).toEqual(['k1']);
  });
});
