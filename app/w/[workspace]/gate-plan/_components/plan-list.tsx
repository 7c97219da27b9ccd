import type { GateRuleView } from '@/lib/workspaces/gate-plan-schemas';
import { daysWord, whenPasses, whoSigns } from '@/lib/workspaces/gate-words';

/** Who signs, and whom four eyes keep away; when an automatic gate passes. */
export function gateSentence(gate: GateRuleView): string {
  if (gate.kind === 'automatic') return whenPasses(gate);
  return gate.fourEyes ? `${whoSigns(gate)} Never the author of the revision.` : whoSigns(gate);
}

/** The gates in their order, as a plan is read. */
export function PlanList({ gates }: { gates: readonly GateRuleView[] }) {
  return (
    <ol className="border border-ink bg-sheet">
      {gates.map((gate, index) => (
        <li
          key={gate.key}
          className="grid gap-x-6 gap-y-1 border-b border-rule px-4 py-4 last:border-b-0 sm:grid-cols-[3rem_12rem_1fr]"
        >
          <span aria-hidden className="font-mono text-lg text-slate">
            {index + 1}
          </span>
          <h2 className="text-lg font-semibold">{gate.name}</h2>
          <div className="min-w-0">
            <p>
              {gateSentence(gate)}
              {gate.dueDays === null ? null : <> Due {daysWord(gate.dueDays)} after it opens.</>}
            </p>
            <p className="mt-1 text-sm text-slate">
              {gate.kind === 'people' ? <>Signed with the words: “{gate.meaning}”</> : gate.meaning}
            </p>
          </div>
        </li>
      ))}
    </ol>
  );
}
