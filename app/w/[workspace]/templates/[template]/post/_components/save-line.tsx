import type { SaveState } from '../_hooks/use-draft';

/** Whether the draft is saved. What clashes with it stands over the form. */
export function SaveLine({ state }: { state: SaveState }) {
  if (state.kind === 'trouble')
    return (
      <p role="status" className="text-sm text-madder">
        {state.clash ? 'The draft is not saved: see above.' : state.detail}
      </p>
    );
  return (
    <p role="status" className="text-sm text-slate">
      {state.kind === 'saving'
        ? 'Saving the draft …'
        : state.at
          ? 'The draft is saved.'
          : 'Changes are saved as you make them.'}
    </p>
  );
}
