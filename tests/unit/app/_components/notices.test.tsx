// @vitest-environment jsdom
import { act } from 'react';
import { createRoot, type Root } from 'react-dom/client';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { NoticeRegion, notify } from '@/app/_components/notices';

describe('notices', () => {
  let root: Root;
  let page: HTMLElement;

  beforeEach(async () => {
    vi.stubGlobal('IS_REACT_ACT_ENVIRONMENT', true);
    vi.useFakeTimers();
    page = document.body.appendChild(document.createElement('div'));
    root = createRoot(page);
    await act(async () => root.render(<NoticeRegion />));
  });
  afterEach(async () => {
    await act(async () => root.unmount());
    page.remove();
    vi.useRealTimers();
    vi.unstubAllGlobals();
  });

  it('leave by themselves, but not while a dialog is in front of them', async () => {
    await act(async () => void notify('Settled.'));
    const dialog = document.body.appendChild(document.createElement('div'));
    dialog.setAttribute('role', 'dialog');
    await act(async () => vi.advanceTimersByTimeAsync(15_000));
    expect(page.textContent).toContain('Settled.');
    dialog.remove();
    await act(async () => vi.advanceTimersByTimeAsync(10_000));
    expect(page.textContent).not.toContain('Settled.');
  });

  it('lie below the layer of dialogs', () => {
    const layer = Number(page.querySelector('.fixed')!.className.match(/\bz-(\d+)/)![1]);
    expect(layer).toBeLessThan(40);
  });
});
