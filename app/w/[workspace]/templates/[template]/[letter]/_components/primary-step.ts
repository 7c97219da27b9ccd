import type { RevisionView } from '@/lib/review/schemas';
import { gateInWords } from './gate-in-words';

/** The one main step of this reader on this page, if there is one. */
export type PrimaryStep =
  | { kind: 'sign'; label: string; detail: string }
  | { kind: 'settle'; label: string; detail: string }
  | { kind: 'release'; label: string; detail: string }
  | { kind: 'download'; label: string; detail: string; href: string }
  | { kind: 'post'; label: string; detail: string; href: string };

/** A newer revision of the template that is still in review or beyond, if any. */
export function newerSibling(revision: RevisionView): RevisionView['siblings'][number] | null {
  const here = revision.siblings.findIndex((sibling) => sibling.id === revision.id);
  return here < 0 ? null : (revision.siblings.slice(here + 1).at(-1) ?? null);
}

/** Signing goes first, then release, then the pack, then the next revision. */
export function primaryStep(
  revision: RevisionView,
  addresses: { pack: string; post: string },
): PrimaryStep | null {
  const { can, release } = revision;
  if (can.sign?.blocked) {
    return { kind: 'settle', label: 'Settle what is open', detail: `then sign. ${can.sign.blocked}` };
  }
  if (can.sign) {
    return {
      kind: 'sign',
      label: `Sign for ${gateInWords(can.sign.gateName)}`,
      detail: 'shows exactly what you sign',
    };
  }
  if (can.release) {
    return { kind: 'release', label: 'Release to production', detail: 'shows the cautions first' };
  }
  if (release?.pack && can.download && revision.state === 'released') {
    return {
      kind: 'download',
      label: 'Download the pack',
      detail: release.pack.fileName,
      href: addresses.pack,
    };
  }
  const closed = revision.state === 'returned' || revision.state === 'withdrawn';
  const shut = revision.gates.some((gate) => gate.kind === 'automatic' && gate.state === 'open');
  const failing = revision.state === 'in_review' && revision.check.verdict === 'fail' && shut;
  if (can.post && (closed || failing) && !newerSibling(revision)) {
    return {
      kind: 'post',
      label: 'Post the next revision',
      detail: 'open items travel with it',
      href: addresses.post,
    };
  }
  return null;
}
