import { SectionHead } from '@/app/_components/section-head';
import { StatusWord } from '@/app/_components/status-word';
import type { StandInsView } from '@/lib/review/stand-in-schemas';
import { writtenDay } from '@/lib/time/written-day';
import { DeleteButton } from '@/app/_components/delete-button';
import { NameStandIn, type NameStandInProps } from './name-stand-in';

type Props = StandInsView & {
  apiPath: string;
  /** Null for whoever has nothing to sign here. */
  naming: Pick<NameStandInProps, 'choices' | 'role'> | null;
};

/** Who is away, now or soon, and who signs for them; whoever signs may name somebody for their own time away. */
export function StandIns({ standIns, today, apiPath, naming }: Props) {
  return (
    <section aria-labelledby="away" className="mt-10">
      <SectionHead title="While somebody is away" id="away" count={standIns.length} />
      {standIns.length ? (
        <ul>
          {standIns.map((one) => (
            <li
              key={one.id}
              className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2 border-b border-rule py-3"
            >
              <p className="min-w-0">
                <span className="font-semibold">{one.standIn.name}</span> signs for{' '}
                <span className="font-semibold">{one.away.name}</span>, {one.role}
                <span className="block text-sm text-slate">
                  {one.fromOn === one.untilOn
                    ? writtenDay(one.fromOn)
                    : `${writtenDay(one.fromOn)} to ${writtenDay(one.untilOn)}`}
                  {one.now ? <StatusWord state="open" word="now" className="ml-3" /> : null}
                </span>
              </p>
              {one.mayEnd ? (
                <DeleteButton
                  apiPath={`${apiPath}/stand-ins/${one.id}`}
                  label={`End that ${one.standIn.name} signs for ${one.away.name}`}
                  done="It was ended. What was signed meanwhile stays."
                >
                  End
                </DeleteButton>
              ) : null}
            </li>
          ))}
        </ul>
      ) : (
        <p className="mt-2 text-base text-slate">Nobody has said that they will be away.</p>
      )}
      <p className="mt-3 max-w-prose text-sm text-slate">
        A stand-in has the role of whoever is away and signs where a gate asks for them; the signature names
        both. Neither the author of a revision nor anybody in the author’s place signs it under four eyes.
      </p>
      {naming ? (
        <div className="mt-3">
          {naming.choices.length ? (
            <NameStandIn apiPath={`${apiPath}/stand-ins`} today={today} {...naming} />
          ) : (
            <p className="text-sm text-slate">
              You are the only {naming.role} here, so nobody can sign for you.
            </p>
          )}
        </div>
      ) : null}
    </section>
  );
}
