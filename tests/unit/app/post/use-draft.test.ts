// @vitest-environment jsdom
import { act, createElement } from 'react';
import { createRoot, type Root } from 'react-dom/client';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { useDraft } from '@/app/w/[workspace]/templates/[template]/post/_hooks/use-draft';

type Sent = { method: string; body: { note: string; version: number } | null };

describe('the draft on the page', () => {
  let root: Root;
  let draft: ReturnType<typeof useDraft>;
  let sent: Sent[];
  let onServer: number;
  /** The draft was posted or discarded; asking for it begins the next one. */
  let gone: boolean;

  /** The server's side of it: a save must name the version that is there. */
  const answer = async (_url: string, init: RequestInit) => {
    const body = init.body ? (JSON.parse(String(init.body)) as Sent['body']) : null;
    sent.push({ method: init.method ?? 'GET', body });
    if (body && body.version !== onServer)
      return new Response(JSON.stringify({ title: 'Changed', detail: 'Changed meanwhile.', status: 412 }), {
        status: 412,
        headers: { 'content-type': 'application/problem+json' },
      });
    if (body && gone)
      return new Response(
        JSON.stringify({ detail: 'There is none.', status: 409, type: '/problems/no-draft' }),
        {
          status: 409,
          headers: { 'content-type': 'application/problem+json' },
        },
      );
    if (body) onServer += 1;
    gone = false;
    return Response.json({ version: onServer, changedBy: { id: 'p2', name: 'Lewin Okafor' } });
  };

  beforeEach(async () => {
    vi.stubGlobal('IS_REACT_ACT_ENVIRONMENT', true);
    vi.stubGlobal('fetch', vi.fn(answer));
    vi.useFakeTimers();
    sent = [];
    onServer = 1;
    gone = false;
    const initial = { uploadId: null, recipe: {}, note: '', version: 1 };
    function Page() {
      draft = useDraft('/api/v1/workspaces/w/templates/t/draft', initial);
      return null;
    }
    root = createRoot(document.createElement('div'));
    await act(async () => root.render(createElement(Page)));
  });
  afterEach(async () => {
    await act(async () => root.unmount());
    vi.useRealTimers();
    vi.unstubAllGlobals();
  });

  it('is saved when the page is left before typing rests', async () => {
    await act(async () => draft.change({ note: 'Left at once' }));
    expect(sent).toEqual([]);
    await act(async () => root.unmount());
    expect(sent).toMatchObject([{ method: 'PUT', body: { note: 'Left at once', version: 1 } }]);
  });

  it('is not sent when nothing was changed, or when it was given up', async () => {
    await act(async () => draft.change({ note: 'Given up' }));
    await act(async () => draft.forget());
    await act(async () => vi.advanceTimersByTimeAsync(5000));
    await act(async () => root.unmount());
    expect(sent).toEqual([]);
  });

  it('says when somebody else changed it, and overwrites theirs only when asked to', async () => {
    onServer = 5;
    await act(async () => draft.change({ note: 'Mine' }));
    await act(async () => vi.advanceTimersByTimeAsync(1000));
    expect(draft.state).toMatchObject({
      kind: 'trouble',
      clash: { kind: 'changed', by: { id: 'p2', name: 'Lewin Okafor' } },
    });
    expect(onServer).toBe(5);
    await act(async () => draft.keepMine());
    expect(sent.at(-1)).toMatchObject({ method: 'PUT', body: { note: 'Mine', version: 5 } });
    expect(draft.state.kind).toBe('saved');
    expect(draft.version.current).toBe(6);
  });

  it('says when it was posted or discarded elsewhere, and begins the next with this form when asked to', async () => {
    gone = true;
    await act(async () => draft.change({ note: 'Typed on' }));
    await act(async () => vi.advanceTimersByTimeAsync(1000));
    expect(draft.state).toMatchObject({ kind: 'trouble', clash: { kind: 'gone' } });
    await act(async () => draft.keepMine());
    expect(sent.at(-1)).toMatchObject({ method: 'PUT', body: { note: 'Typed on', version: 1 } });
    expect(draft.state.kind).toBe('saved');
  });
});
