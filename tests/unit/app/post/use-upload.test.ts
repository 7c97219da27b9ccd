// @vitest-environment jsdom
import { act, createElement } from 'react';
import { createRoot, type Root } from 'react-dom/client';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { useUpload } from '@/app/w/[workspace]/templates/[template]/post/_hooks/use-upload';
import type { UploadView } from '@/lib/review/schemas';

const upload = (state: UploadView['state']): UploadView => ({
  id: '0192f1c4-0000-7000-8000-0000000000c1',
  fileName: 'lid.stl',
  bytes: 684,
  lastModified: 1_790_000_000_000,
  unit: 'mm',
  partBytes: 8_388_608,
  partCount: 1,
  partsDone: [],
  state,
  refusal: null,
  mesh: null,
});

const problem = (status: number, reason: string) =>
  new Response(JSON.stringify({ type: `/problems/${reason}`, title: 'No', detail: 'In words.', status }), {
    status,
    headers: { 'content-type': 'application/problem+json' },
  });

describe('the file of the draft', () => {
  let root: Root;
  let file: ReturnType<typeof useUpload>;
  let asked: string[];
  const changed = vi.fn();

  async function show(initial: UploadView, answer: (path: string) => Response): Promise<void> {
    vi.stubGlobal('IS_REACT_ACT_ENVIRONMENT', true);
    vi.stubGlobal(
      'fetch',
      vi.fn(async (path: string) => {
        asked.push(path.split('/').slice(6).join('/'));
        return answer(path);
      }),
    );
    function Page() {
      file = useUpload('/api/v1/workspaces/w', 't', initial, changed);
      return null;
    }
    root = createRoot(document.createElement('div'));
    await act(async () => root.render(createElement(Page)));
  }

  beforeEach(() => {
    asked = [];
    changed.mockReset();
  });
  afterEach(async () => {
    await act(async () => root.unmount());
    vi.unstubAllGlobals();
  });

  it.each(['ready', 'refused'] as const)('is dropped without asking when it is %s', async (state) => {
    await show(upload(state), () => problem(403, 'not-your-upload'));
    await act(async () => file.cancel());
    expect(asked).toEqual([]);
    expect(changed).toHaveBeenCalledWith(null);
    expect(file.sending).toMatchObject({ phase: 'idle', trouble: null });
  });

  it('is dropped when a colleague is sending it', async () => {
    await show(upload('sending'), () => problem(403, 'not-your-upload'));
    await act(async () => file.cancel());
    expect(asked).toHaveLength(1);
    expect(changed).toHaveBeenCalledWith(null);
    expect(file.sending.phase).toBe('idle');
  });

  it('stays when it cannot be cancelled for another reason', async () => {
    await show(upload('sending'), () => problem(503, 'store-unavailable'));
    await act(async () => file.cancel());
    expect(changed).not.toHaveBeenCalled();
    expect(file.sending).toMatchObject({ phase: 'paused', trouble: 'In words.' });
  });

  it('goes on only as it was when sending began', async () => {
    await show(upload('sending'), () => problem(503, 'store-unavailable'));
    const newer = new File([new Uint8Array(684)], 'lid.stl', { lastModified: 1_790_000_060_000 });
    await act(async () => file.resume(newer));
    expect(asked).toEqual([]);
    expect(file.sending.trouble).toContain('it was changed since');
    const same = new File([new Uint8Array(684)], 'lid.stl', { lastModified: 1_790_000_000_000 });
    await act(async () => file.resume(same));
    expect(asked).toHaveLength(1);
  });

  it('sends after a reload only the parts that had not arrived whole, and keeps each at once', async () => {
    const broken = { ...upload('sending'), bytes: 25, partBytes: 10, partCount: 3, partsDone: [1] };
    const puts: { url: string; bytes: number }[] = [];
    // Answers each part as the store does; the last one is held back to pause in the middle of it.
    class Store {
      upload: { onprogress?: (event: { loaded: number }) => void } = {};
      onloadend?: () => void;
      status = 0;
      url = '';
      getResponseHeader = () => (this.status === 200 ? '"etag"' : null);
      open(_: string, url: string) {
        this.url = url;
      }
      send(body: Blob) {
        puts.push({ url: this.url, bytes: body.size });
        this.upload.onprogress?.({ loaded: body.size });
        if (this.url.endsWith('/3') && puts.length < 3) return;
        this.status = 200;
        queueMicrotask(() => this.onloadend?.());
      }
      abort() {
        this.onloadend?.();
      }
    }
    await show(broken, () => problem(500, 'unasked'));
    vi.stubGlobal('XMLHttpRequest', Store);
    vi.stubGlobal(
      'fetch',
      vi.fn(async (path: string, init: RequestInit) => {
        if (!path.endsWith('/parts'))
          return Response.json(path.endsWith('/complete') ? { ...broken, state: 'reading' } : broken);
        const [number] = (JSON.parse(String(init.body)) as { parts: number[] }).parts;
        return Response.json({ parts: [{ number, url: `/store/${number}`, bytes: number === 3 ? 5 : 10 }] });
      }),
    );
    expect(file.sending).toMatchObject({ phase: 'paused', needsFile: true, progress: 0.4 });
    const picked = new File([new Uint8Array(25)], 'lid.stl', { lastModified: 1_790_000_000_000 });
    await act(async () => file.resume(picked));
    await vi.waitFor(() => expect(file.sending.upload?.partsDone).toEqual([1, 2]));
    expect(file.sending.progress).toBe(1);
    await act(async () => file.pause());
    await vi.waitFor(() =>
      expect(file.sending).toMatchObject({ phase: 'paused', progress: 0.8, trouble: null }),
    );
    await act(async () => file.resume());
    await vi.waitFor(() => expect(file.sending.phase).toBe('reading'));
    expect(puts).toEqual([
      { url: '/store/2', bytes: 10 },
      { url: '/store/3', bytes: 5 },
      { url: '/store/3', bytes: 5 },
    ]);
  });

  it('is read again in another unit, and stays as it was when that is refused', async () => {
    await show(upload('ready'), () => Response.json({ ...upload('reading'), unit: 'in' }));
    await act(async () => file.readIn('in'));
    expect(asked).toEqual(['0192f1c4-0000-7000-8000-0000000000c1/unit']);
    expect(file.sending).toMatchObject({ phase: 'reading', upload: { unit: 'in' } });
    await act(async () => root.unmount());
    await show(upload('ready'), () => problem(409, 'own-unit'));
    await act(async () => file.readIn('in'));
    expect(file.sending).toMatchObject({ phase: 'ready', trouble: 'In words.', upload: { unit: 'mm' } });
  });
});
