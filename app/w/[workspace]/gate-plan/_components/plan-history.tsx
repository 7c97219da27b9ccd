import { SectionHead } from '@/app/_components/section-head';
import { daysWord } from '@/lib/workspaces/gate-words';
import type { GatePlanVersion } from '@/lib/workspaces/read-gate-plan';
import { gateSentence } from './plan-list';
import { WrittenTime } from './written-time';

/** Every version with what it changed, newest first; each opens to its gates. */
export function PlanHistory({ versions, zone }: { versions: readonly GatePlanVersion[]; zone: string }) {
  return (
    <section aria-labelledby="versions" className="mt-10">
      <SectionHead title="Versions" id="versions" count={versions.length} />
      <ol>
        {versions.map((version, index) => (
          <li key={version.number} className="border-b border-rule py-3">
            <p className="flex flex-wrap items-baseline gap-x-3">
              <span className="font-semibold">Version {version.number}</span>
              {index === 0 ? <span className="text-sm font-medium text-verdigris">now</span> : null}
              <span className="text-sm text-slate">
                {version.madeBy ? `${version.madeBy}, ` : ''}
                <WrittenTime at={version.madeAt} show="moment" zone={zone} />
              </span>
            </p>
            {version.changes.length ? (
              <ul className="mt-1 list-disc pl-5 text-sm">
                {version.changes.map((change) => (
                  <li key={change}>{change.charAt(0).toUpperCase() + change.slice(1)}</li>
                ))}
              </ul>
            ) : (
              <p className="mt-1 text-sm text-slate">The plan that the workspace began with.</p>
            )}
            <details className="mt-1 text-sm">
              <summary className="w-fit cursor-pointer py-1 text-verdigris hover:underline">
                Gates of version {version.number}
              </summary>
              <ol className="mt-1 list-decimal space-y-1 pl-5">
                {version.gates.map((gate) => (
                  <li key={gate.key}>
                    <span className="font-semibold">{gate.name}.</span> {gateSentence(gate)}
                    {gate.dueDays === null ? null : ` Due ${daysWord(gate.dueDays)} after it opens.`}
                    {gate.kind === 'people' ? ` “${gate.meaning}”` : null}
                  </li>
                ))}
              </ol>
            </details>
          </li>
        ))}
      </ol>
    </section>
  );
}
