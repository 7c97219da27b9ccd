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
