import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { renderToStaticMarkup } from 'react-dom/server';
import type { ReactNode } from 'react';
import { describe, expect, it } from 'vitest';
import { memoryStore } from '@/app/_components/note-editor/key-value-store';
import { NoteOutbox, type OutgoingEntry } from '@/app/_components/note-editor/note-outbox';
import { OutboxContext } from '@/app/_components/note-editor/outbox-provider';
import { CheckPanel } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/check-panel';
import { OutgoingNoteEntry } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/note-entry';
import { RoomProvider } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/room-context';
import { StateBanner } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/state-banner';
import type { RevisionView } from '@/lib/review/schemas';
import { ids, revision } from './fixtures/revision';
import { room } from './fixtures/room';

const show = (view: RevisionView, children: ReactNode) =>
  renderToStaticMarkup(
    <QueryClientProvider client={new QueryClient()}>
      <RoomProvider value={room({ revision: view })}>{children}</RoomProvider>
    </QueryClientProvider>,
  );

const can = (change: Partial<RevisionView['can']>) => ({ ...revision().can, ...change });
const failed = { ...revision().check, state: 'failed' as const, error: 'the mesh is not closed.' };

describe('“Check again”', () => {
  const panel = (view: RevisionView) => show(view, <CheckPanel revision={view} />);

  it('stands beside a check that failed, for those who may post, while the revision is in review', () => {
    const html = panel(revision({ check: failed, can: can({ post: true }) }));
    expect(html).toContain('Check again');
    expect(html).toContain('The mesh is not closed.');
  });

  it.each([
    ['a reader who may not post', { check: failed, can: can({ post: false }) }],
    ['a revision that is closed', { check: failed, can: can({ post: true }), state: 'withdrawn' as const }],
    ['a check that finished', { can: can({ post: true }) }],
    ['a check that runs', { check: { ...failed, state: 'running' as const }, can: can({ post: true }) }],
  ])('does not for %s', (_who, change) => {
    expect(panel(revision(change))).not.toContain('Check again');
  });
});

describe('“Build it again”', () => {
  type PackJob = NonNullable<RevisionView['release']>['packJob'];
  const banner = (packJob: PackJob, rebuild: boolean) => {
    const view = revision({
      state: 'released',
      lockedAt: '2026-12-01T11:00:00.000Z',
      can: can({ rebuild }),
      release: {
        id: '0192f1c4-0000-7000-8000-0000000000d1',
        byName: 'J. Halvorsen',
        at: '2026-12-01T11:10:00.000Z',
        note: '',
        pack: null,
        packJob,
      },
    });
    return show(view, <StateBanner revision={view} />);
  };

  it('stands beside a pack that could not be built, for those who may release', () => {
    const html = banner({ state: 'failed', error: 'The store did not answer.' }, true);
    expect(html).toContain('Build it again');
    expect(html).toContain('The store did not answer.');
  });

  it('does not while the pack is on its way, nor for those who may not', () => {
    expect(banner({ state: 'running', error: null }, true)).not.toContain('Build it again');
    const html = banner({ state: 'failed', error: null }, false);
    expect(html).not.toContain('Build it again');
    expect(html).toContain('A producer or lead can order it again.');
  });
});

describe('“Take it back”', () => {
  const outbox = new NoteOutbox(
    {
      store: memoryStore(),
      send: async () => undefined,
      onSent: () => undefined,
      onRefused: () => undefined,
      onTakenBack: () => undefined,
    },
    ids.brandt,
  );
  const entry = (state: OutgoingEntry['state']) =>
    show(
      revision(),
      <OutboxContext value={outbox}>
        <OutgoingNoteEntry
          entry={
            { clientKey: ids.client, body: { type: 'doc', content: [] }, state } as unknown as OutgoingEntry
          }
        />
      </OutboxContext>,
    );

  it('stands beside a note of one’s own that the server could not take, and no other', () => {
    expect(entry('stuck')).toContain('Take it back');
    for (const state of ['sending', 'waiting', 'signed-out'] as const)
      expect(entry(state)).not.toContain('Take it back');
  });
});
