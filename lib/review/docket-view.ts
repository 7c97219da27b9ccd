import type { Docket, DocketThread } from './load-docket';
import type { DocketView, FindingView, ThreadView } from './schemas';

/** The docket as pages, packs and locks have it: plain JSON. */
export function viewDocketRows(revisionId: string, docket: Docket): DocketView {
  const waivers = new Map(docket.waivers.map((waiver) => [waiver.findingId, waiver]));
  const threadOf = new Map(docket.threads.map(({ thread, findingId }) => [findingId, thread.id]));
  const findings: FindingView[] = docket.findings.map((finding) => {
    const waiver = waivers.get(finding.id);
    return {
      id: finding.id,
      checkId: finding.checkId,
      status: finding.status,
      measured: finding.measured,
      limit: finding.limit,
      unit: finding.unit,
      message: finding.message,
      remedy: finding.remedy,
      basis: { source: finding.basis.source, kind: finding.basis.kind },
      places: finding.places,
      waiver: waiver
        ? { reason: waiver.reason, by: waiver.waivedByName, at: waiver.createdAt.toISOString() }
        : null,
      threadId: threadOf.get(finding.id) ?? null,
    };
  });
  const threads = docket.threads.map(viewThreadRow);
  return { revisionId, findings, threads, counts: countItems(findings, threads) };
}

/** One thread on one revision, as plain JSON. */
export function viewThreadRow({ thread, placement, openedOn, findingId, notes }: DocketThread): ThreadView {
  return {
    id: thread.id,
    openedOn,
    findingId,
    mustSettle: thread.mustSettle,
    afterApproval: thread.afterApproval,
    state: thread.state,
    settledByName: thread.settledByName,
    settledAt: thread.settledAt?.toISOString() ?? null,
    pin: placement.pin as ThreadView['pin'],
    standing: placement.standing,
    distanceMm: placement.distanceMm,
    openedByName: thread.openedByName,
    createdAt: thread.createdAt.toISOString(),
    notes: notes.map((note) => ({
      id: note.id,
      authorId: note.authorId,
      authorName: note.authorName,
      body: note.body,
      text: note.text,
      createdAt: note.createdAt.toISOString(),
    })),
    version: thread.version,
  };
}

/** What must be settled, what is to be looked at, what is settled; a thread about a finding counts with it. */
function countItems(findings: FindingView[], threads: ThreadView[]): DocketView['counts'] {
  const counts = { mustSettle: 0, look: 0, settled: 0 };
  for (const finding of findings) {
    if (finding.status === 'fail') counts[finding.waiver ? 'settled' : 'mustSettle']++;
    else if (finding.status === 'caution') counts.look++;
  }
  for (const thread of threads) {
    if (thread.afterApproval) continue;
    if (thread.state === 'settled') counts.settled++;
    else counts[thread.mustSettle ? 'mustSettle' : 'look']++;
  }
  return counts;
}
