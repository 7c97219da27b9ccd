import type { SaveState } from '../_hooks/use-draft';

type Props = { state: SaveState; /** Something on the page is marked as wrong. */ marked: boolean };

/** Whether the draft is saved. What clashes with it stands over the form. */
export function SaveLine({ state, marked }: Props) {
  if (state.kind === 'trouble')
    return (
      <p role="status" className="text-sm text-madder">
        {state.clash ? 'The draft is not saved: see above.' : state.detail}
      </p>
    );
  return (
    <p role="status" className="text-sm text-slate">
      {words(state, marked)}
    </p>
  );
}

function words(state: Exclude<SaveState, { kind: 'trouble' }>, marked: boolean): string {
  if (state.kind === 'saving') return 'Saving the draft …';
  if (marked) return 'The draft is kept as it stands. Mend what is marked before posting it.';
  return state.at ? 'The draft is saved.' : 'Changes are saved as you make them.';
}
