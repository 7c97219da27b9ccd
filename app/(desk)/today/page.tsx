import type { Metadata } from 'next';
import NextLink from 'next/link';
import { DueDay } from '@/app/_components/due-day';
import { RefreshOnLive } from '@/app/_components/live/refresh-on-live';
import { PageHeader } from '@/app/_components/page-header';
import { SectionHead } from '@/app/_components/section-head';
import { StatusWord, type State } from '@/app/_components/status-word';
import { Time } from '@/app/_components/time';
import { enterDesk } from '@/app/_frames/enter-page';
import { DeskFrame } from '@/app/_frames/desk-frame';
import { spacesOf } from '@/app/_frames/spaces';
import { personContext } from '@/lib/auth/context';
import type { TodayItem, TodayView } from '@/lib/review/today-schemas';
import { viewToday } from '@/lib/review/view-today';
import { NothingWaits } from './_components/nothing-waits';
import { Places } from './_components/places';

export const metadata: Metadata = { title: 'Today' };

const kinds: Record<TodayItem['kind'], { state: State; word: string }> = {
  sign: { state: 'open', word: 'sign' },
  settle: { state: 'must-settle', word: 'settle' },
  answer: { state: 'note', word: 'answer' },
  fix: { state: 'must-settle', word: 'mend' },
  release: { state: 'approved', word: 'release' },
  draft: { state: 'draft', word: 'post' },
  mention: { state: 'note', word: 'you were named' },
};

/** What waits on the reader, and since when, across every workspace. */
export default async function TodayPage() {
  const person = await enterDesk();
  const today = await viewToday(personContext(person));
  const places = await spacesOf(person.id, '');
  const waits = today.items.length;
  return (
    <DeskFrame person={person} crumbs={[{ label: 'Today' }]}>
      <RefreshOnLive events={['today.changed']} />
      <PageHeader
        title="Today"
        lead={
          waits === 0
            ? 'Nothing waits on you.'
            : waits === 1
              ? 'One thing waits on you.'
              : `${waits} things wait on you, the longest first.`
        }
      />
      <div className="grid grid-cols-1 gap-x-10 gap-y-8 lg:grid-cols-[2fr_1fr]">
        <section aria-labelledby="waits">
          <SectionHead title="Waits on you" id="waits" count={waits} tone={waits ? 'madder' : 'ink'} />
          {waits ? (
            <ol className="mt-1">
              {today.items.map((item) => (
                <Waiting key={`${item.kind}-${item.path}-${item.since}`} item={item} />
              ))}
            </ol>
          ) : (
            <div className="mt-3">
              <NothingWaits places={places} />
            </div>
          )}
        </section>
        <div className="flex min-w-0 flex-col gap-8">
          <Places places={places} />
          <section aria-labelledby="recent">
            <SectionHead title="Lately" id="recent" />
            <Recent recent={today.recent} />
          </section>
        </div>
      </div>
    </DeskFrame>
  );
}

function Waiting({ item }: { item: TodayItem }) {
  const { state, word } = kinds[item.kind];
  return (
    <li className="relative grid grid-cols-[7.5rem_1fr] gap-x-4 gap-y-1 border-b border-rule py-3.5 hover:bg-sheet max-sm:grid-cols-1">
      <StatusWord state={state} word={word} className="text-sm" />
      <div className="min-w-0">
        <NextLink
          href={item.path}
          className="text-md font-semibold text-ink no-underline after:absolute after:inset-0 hover:underline"
        >
          {item.text}
        </NextLink>
        <p className="mt-0.5 flex flex-wrap gap-x-3 text-sm text-slate">
          <span>
            <span className="font-mono">{item.templateNumber}</span> {item.templateTitle}
            {item.letter ? `, revision ${item.letter}` : ''}
          </span>
          <span>{item.workspace.name}</span>
          <span>
            for <Time at={item.since} show="span" />
          </span>
          {item.dueOn ? (
            <span>
              due <DueDay on={item.dueOn} standing={item.standing} />
            </span>
          ) : null}
        </p>
      </div>
    </li>
  );
}

function Recent({ recent }: { recent: TodayView['recent'] }) {
  if (recent.length === 0) return <p className="mt-3 text-sm text-slate">Nothing has happened yet.</p>;
  return (
    <ol className="mt-1">
      {recent.map((entry) => (
        <li key={`${entry.path}-${entry.at}-${entry.text}`} className="border-b border-rule py-2.5 text-sm">
          <NextLink href={entry.path} className="text-ink no-underline hover:underline">
            {entry.text}
          </NextLink>
          <p className="text-slate">
            {entry.workspace}, <Time at={entry.at} show="relative" />
          </p>
        </li>
      ))}
    </ol>
  );
}
