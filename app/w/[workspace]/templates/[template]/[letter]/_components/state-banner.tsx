'use client';

import type { ReactNode } from 'react';
import { Button } from '@/app/_components/button';
import { formatBytes } from '@/app/_components/format-figure';
import { Digest } from '@/app/_components/digest';
import { Link } from '@/app/_components/link';
import { states, StatusWord } from '@/app/_components/status-word';
import { Time } from '@/app/_components/time';
import type { RevisionView } from '@/lib/review/schemas';
import { useOrderAgain } from '../_hooks/use-room-commands';
import { newerSibling } from './primary-step';
import { letterHref, stateKey } from './revision-switcher';
import { useRoom } from './room-context';

/** Where the revision stands, when that is not simply "in review": what is agreed, or why it is closed. */
export function StateBanner({ revision }: { revision: RevisionView }) {
  const { workspace } = useRoom();
  const newer = newerSibling(revision);
  const newerLine = newer ? (
    <p>
      Revision {newer.letter}, posted since, is {states[stateKey(newer.state)].word}.{' '}
      <Link href={letterHref(workspace.slug, revision.template.id, newer.letter)}>
        Go to revision {newer.letter}
      </Link>
    </p>
  ) : null;
  if (revision.state === 'in_review') {
    return newer ? <Banner tone="ochre">{newerLine}</Banner> : null;
  }
  const reason = revision.stateReason ? <p>“{revision.stateReason}”</p> : null;
  const bad = revision.state === 'returned' || revision.state === 'recalled';
  return (
    <Banner tone={bad ? 'madder' : revision.lockedAt ? 'ink' : 'slate'}>
      <p className="font-semibold">
        <StatusWord state={stateKey(revision.state)} word={stateWord(revision)} />
      </p>
      {newerLine}
      {reason}
      {revision.lockedAt ? <Agreed revision={revision} lockedAt={revision.lockedAt} /> : null}
    </Banner>
  );
}

function stateWord({ state }: RevisionView): string {
  const { word } = states[stateKey(state)];
  return word.charAt(0).toUpperCase() + word.slice(1);
}

function Agreed({ revision, lockedAt }: { revision: RevisionView; lockedAt: string }) {
  const signers = revision.gates.flatMap((gate) =>
    gate.signatures
      .filter((s) => s.decision === 'sign')
      .map((s) => (s.signedFor ? `${s.printedName} (for ${s.signedFor})` : s.printedName)),
  );
  return (
    <div className="flex flex-col gap-1">
      <p>
        Agreed by {signers.length > 0 ? listNames(signers) : 'the gate plan'} on{' '}
        <Time at={lockedAt} show="moment" />: the mesh {revision.mesh.fileName} (
        {formatBytes(revision.mesh.bytes)}), its recipe, the report, the docket and the signatures, as they
        were then. Nothing of it changes any more.
      </p>
      {revision.contentDigest ? (
        <p className="text-sm text-slate">
          Content <Digest value={revision.contentDigest} characters="all" className="ml-1" />
        </p>
      ) : null}
      <p className="text-sm text-slate">
        Mesh SHA-256 <Digest value={revision.mesh.sha256} characters="all" className="ml-1" />
      </p>
      {revision.release && !revision.release.pack ? <PackOnItsWay revision={revision} /> : null}
    </div>
  );
}

function PackOnItsWay({ revision }: { revision: RevisionView }) {
  const { workspace } = useRoom();
  const again = useOrderAgain(workspace.id, revision.id, 'pack');
  const job = revision.release?.packJob;
  if (job?.state !== 'failed')
    return (
      <p role="status" className="text-sm">
        The release pack is being built.
      </p>
    );
  return (
    <div role="status" className="flex flex-wrap items-center gap-3">
      <p>The release pack could not be built: {job.error ?? 'The worker gave no reason.'}</p>
      {revision.can.rebuild ? (
        <Button isPending={again.isPending} onPress={() => again.mutate()}>
          Build it again
        </Button>
      ) : (
        <p>A producer or lead can order it again.</p>
      )}
    </div>
  );
}

function listNames(names: readonly string[]): string {
  if (names.length < 2) return names[0] ?? '';
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;
}

const tones = {
  ochre: 'border-l-ochre',
  madder: 'border-l-madder',
  ink: 'border-l-ink',
  slate: 'border-l-edge',
};

function Banner({ tone, children }: { tone: keyof typeof tones; children: ReactNode }) {
  return (
    <div
      className={`flex flex-col gap-1 border border-l-4 border-rule bg-sheet px-4 py-3 text-base ${tones[tone]}`}
    >
      {children}
    </div>
  );
}
