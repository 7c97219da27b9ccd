import { alias, type PgColumn } from 'drizzle-orm/pg-core';
import { and, asc, count, desc, eq, inArray, isNotNull, isNull, min, ne, or, sql } from 'drizzle-orm';
import { checkRuns, findings, waivers } from '@/db/schema/checks';
import { notes, placements, threads } from '@/db/schema/docket';
import { gates, signatures, standIns } from '@/db/schema/gates';
import { drafts, meshes, revisions, templates } from '@/db/schema/templates';
import { auditEntries } from '@/db/schema/trail';
import { users } from '@/db/schema/identity';
import { members, workspaces } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';
import { signingRoles } from '@/lib/workspaces/check-gate-plan';

/** What every row of a desk says about where it is. */
const place = {
  workspaceId: workspaces.id,
  workspaceName: workspaces.name,
  workspaceSlug: workspaces.slug,
  templateId: templates.id,
  number: templates.number,
  title: templates.title,
  dueOn: templates.dueOn,
  standing: templates.standing,
  letter: revisions.letter,
};

const ofTemplate = and(
  eq(templates.workspaceId, revisions.workspaceId),
  eq(templates.id, revisions.templateId),
);
const ofWorkspace = eq(workspaces.id, revisions.workspaceId);
const membership = (personId: string) =>
  and(eq(members.workspaceId, revisions.workspaceId), eq(members.userId, personId));
const most = 200;

/** An open item of a docket that must be settled on the revision in `placements`. */
const mustSettle = and(
  eq(threads.state, 'open'),
  eq(threads.mustSettle, true),
  eq(threads.afterApproval, false),
);

/** Whether an open gate asks the member in a row, by name or else by role; as `asks` in who-signs.ts. */
const asked = (member: { userId: PgColumn; role: PgColumn }) => sql`case
  when jsonb_array_length(coalesce(${gates.rule}->'people', '[]')) > 0
    then ${gates.rule}->'people' ? ${member.userId}::text and ${member.role} = any(${sql.param([...signingRoles])})
  else ${gates.rule}->'roles' ? ${member.role} end`;
const keptAway = (userId: PgColumn) =>
  sql`((${gates.rule}->>'fourEyes')::boolean and ${userId} in (${revisions.authorId}, ${meshes.createdBy}))`;
/** Whether somebody has answered at the gate, themselves or through their stand-in. */
const answered = (userId: PgColumn) => sql`exists (select 1 from ${signatures}
  where ${signatures.workspaceId} = ${gates.workspaceId} and ${signatures.gateId} = ${gates.id}
    and ${userId} in (${signatures.signerId}, ${signatures.signedForId}))`;
const away = alias(members, 'away');

/**
 * Open people's gates that this person may sign now, for themselves or for whom they stand in; those kept shut by items
 * to settle wait on others first. The same as `rightAt` in who-signs.ts, over all workspaces at once.
 */
export async function gatesToSign(tx: TenantTx, personId: string) {
  const forMe = and(asked(members), sql`not ${answered(members.userId)}`);
  return tx
    .select({
      ...place,
      gateName: sql<string>`${gates.rule}->>'name'`,
      gateDueOn: gates.dueOn,
      since: gates.openedAt,
      /** Whom this person would sign for, where the gate does not ask them. */
      standsFor: sql<
        string | null
      >`case when not coalesce(${forMe}, false) then (select ${users.name} from ${users}
        where ${users.id} = ${away.userId}) end`,
    })
    .from(gates)
    .innerJoin(
      revisions,
      and(eq(revisions.workspaceId, gates.workspaceId), eq(revisions.id, gates.revisionId)),
    )
    .innerJoin(meshes, and(eq(meshes.workspaceId, revisions.workspaceId), eq(meshes.id, revisions.meshId)))
    .innerJoin(templates, ofTemplate)
    .innerJoin(workspaces, ofWorkspace)
    .innerJoin(members, membership(personId))
    .leftJoin(
      standIns,
      and(
        eq(standIns.workspaceId, gates.workspaceId),
        eq(standIns.standInId, personId),
        isNull(standIns.endedAt),
        sql`(clock_timestamp() at time zone ${workspaces.timeZone})::date between ${standIns.fromOn} and ${standIns.untilOn}`,
      ),
    )
    .leftJoin(
      away,
      and(
        eq(away.workspaceId, standIns.workspaceId),
        eq(away.userId, standIns.personId),
        eq(away.role, members.role),
      ),
    )
    .where(
      and(
        eq(gates.state, 'open'),
        eq(revisions.state, 'in_review'),
        sql`${gates.rule}->>'kind' = 'people'`,
        sql`not ${keptAway(members.userId)}`,
        sql`not exists (select 1 from ${signatures} where ${signatures.workspaceId} = ${gates.workspaceId}
          and ${signatures.gateId} = ${gates.id} and ${signatures.signerId} = ${personId})`,
        or(
          forMe,
          and(
            sql`${away.id} is not null`,
            asked(away),
            sql`not ${keptAway(away.userId)}`,
            sql`not ${answered(away.userId)}`,
          ),
        ),
        sql`not exists (select 1 from ${placements} join ${threads} on ${threads.workspaceId} = ${placements.workspaceId}
          and ${threads.id} = ${placements.threadId} where ${placements.workspaceId} = ${revisions.workspaceId}
          and ${placements.revisionId} = ${revisions.id} and ${mustSettle})`,
      ),
    )
    .orderBy(asc(gates.openedAt))
    .limit(most);
}

/** Items that must be settled on revisions in review that this person posted or where they opened the item. */
export async function itemsToSettle(tx: TenantTx, personId: string) {
  return tx
    .select({ ...place, n: count(), since: min(threads.createdAt) })
    .from(placements)
    .innerJoin(
      threads,
      and(eq(threads.workspaceId, placements.workspaceId), eq(threads.id, placements.threadId)),
    )
    .innerJoin(
      revisions,
      and(eq(revisions.workspaceId, placements.workspaceId), eq(revisions.id, placements.revisionId)),
    )
    .innerJoin(templates, ofTemplate)
    .innerJoin(workspaces, ofWorkspace)
    .innerJoin(members, membership(personId))
    .where(
      and(
        eq(revisions.state, 'in_review'),
        mustSettle,
        sql`${personId} in (${revisions.authorId}, ${threads.openedBy})`,
      ),
    )
    .groupBy(workspaces.id, templates.workspaceId, templates.id, revisions.letter)
    .limit(most);
}

/** Failing findings, not waived, on revisions in review that this person posted. */
export async function findingsToMend(tx: TenantTx, personId: string) {
  return tx
    .select({ ...place, n: count(), since: min(checkRuns.finishedAt) })
    .from(findings)
    .innerJoin(
      revisions,
      and(eq(revisions.workspaceId, findings.workspaceId), eq(revisions.id, findings.revisionId)),
    )
    .innerJoin(
      checkRuns,
      and(eq(checkRuns.workspaceId, revisions.workspaceId), eq(checkRuns.revisionId, revisions.id)),
    )
    .innerJoin(templates, ofTemplate)
    .innerJoin(workspaces, ofWorkspace)
    .innerJoin(members, membership(personId))
    .leftJoin(waivers, and(eq(waivers.workspaceId, findings.workspaceId), eq(waivers.findingId, findings.id)))
    .where(
      and(
        eq(findings.status, 'fail'),
        sql`${waivers.id} is null`,
        eq(revisions.state, 'in_review'),
        eq(revisions.authorId, personId),
      ),
    )
    .groupBy(workspaces.id, templates.workspaceId, templates.id, revisions.letter)
    .limit(most);
}

/** Approved revisions, where this person is one who releases. */
export async function revisionsToRelease(tx: TenantTx, personId: string) {
  return tx
    .select({ ...place, since: revisions.stateAt })
    .from(revisions)
    .innerJoin(templates, ofTemplate)
    .innerJoin(workspaces, ofWorkspace)
    .innerJoin(members, membership(personId))
    .where(and(eq(revisions.state, 'approved'), inArray(members.role, ['producer', 'lead'])))
    .orderBy(asc(revisions.stateAt))
    .limit(most);
}

/** Revisions that were returned to this person and that nothing has followed yet. */
export async function returnedRevisions(tx: TenantTx, personId: string) {
  return tx
    .select({ ...place, reason: revisions.stateReason, since: revisions.stateAt })
    .from(revisions)
    .innerJoin(
      templates,
      and(
        ofTemplate,
        or(eq(templates.latestRevisionId, revisions.id), eq(templates.standingRevisionId, revisions.id)),
      ),
    )
    .innerJoin(workspaces, ofWorkspace)
    .innerJoin(members, membership(personId))
    .where(and(eq(revisions.state, 'returned'), eq(revisions.authorId, personId)))
    .orderBy(asc(revisions.stateAt))
    .limit(most);
}

/** Drafts that this person began and that hold something: opening the page alone makes nothing to do. */
export async function openDrafts(tx: TenantTx, personId: string) {
  const { letter: _letter, ...draftPlace } = place;
  return tx
    .select({ ...draftPlace, since: drafts.changedAt })
    .from(drafts)
    .innerJoin(
      templates,
      and(eq(templates.workspaceId, drafts.workspaceId), eq(templates.id, drafts.templateId)),
    )
    .innerJoin(workspaces, eq(workspaces.id, drafts.workspaceId))
    .innerJoin(members, and(eq(members.workspaceId, drafts.workspaceId), eq(members.userId, personId)))
    .where(and(eq(drafts.authorId, personId), or(ne(drafts.version, 1), isNotNull(drafts.uploadId))))
    .orderBy(asc(drafts.changedAt))
    .limit(most);
}

/** Notes that name this person in open threads where they have not spoken since. */
export async function mentionsToAnswer(tx: TenantTx, personId: string) {
  return tx
    .select({
      ...place,
      threadId: threads.id,
      authorName: notes.authorName,
      text: notes.text,
      since: notes.createdAt,
    })
    .from(notes)
    .innerJoin(threads, and(eq(threads.workspaceId, notes.workspaceId), eq(threads.id, notes.threadId)))
    .innerJoin(
      revisions,
      and(eq(revisions.workspaceId, notes.workspaceId), eq(revisions.id, notes.revisionId)),
    )
    .innerJoin(templates, ofTemplate)
    .innerJoin(workspaces, ofWorkspace)
    .innerJoin(members, membership(personId))
    .where(
      and(
        sql`${notes.mentions} ? ${personId}`,
        ne(notes.authorId, personId),
        eq(threads.state, 'open'),
        inArray(revisions.state, ['in_review', 'approved', 'released']),
        sql`not exists (select 1 from ${notes} later where later.workspace_id = ${notes.workspaceId}
          and later.thread_id = ${notes.threadId} and later.author_id = ${personId}
          and later.created_at > ${notes.createdAt})`,
      ),
    )
    .orderBy(asc(notes.createdAt))
    .limit(most);
}

/** The last note of each open thread in review that answers this person: on what they posted or opened. */
export async function notesToAnswer(tx: TenantTx, personId: string) {
  const last = tx
    .selectDistinctOn([notes.workspaceId, notes.threadId], {
      workspaceId: notes.workspaceId,
      threadId: notes.threadId,
      revisionId: notes.revisionId,
      authorId: notes.authorId,
      authorName: notes.authorName,
      text: notes.text,
      createdAt: notes.createdAt,
    })
    .from(notes)
    .innerJoin(
      threads,
      and(
        eq(threads.workspaceId, notes.workspaceId),
        eq(threads.id, notes.threadId),
        eq(threads.state, 'open'),
        // What must be settled is said once, as such.
        eq(threads.mustSettle, false),
      ),
    )
    .orderBy(notes.workspaceId, notes.threadId, desc(notes.createdAt), desc(notes.id))
    .as('last');
  return tx
    .select({
      ...place,
      threadId: last.threadId,
      authorName: last.authorName,
      text: last.text,
      since: last.createdAt,
    })
    .from(last)
    .innerJoin(threads, and(eq(threads.workspaceId, last.workspaceId), eq(threads.id, last.threadId)))
    .innerJoin(revisions, and(eq(revisions.workspaceId, last.workspaceId), eq(revisions.id, last.revisionId)))
    .innerJoin(templates, ofTemplate)
    .innerJoin(workspaces, ofWorkspace)
    .innerJoin(members, membership(personId))
    .where(
      and(
        ne(last.authorId, personId),
        eq(revisions.state, 'in_review'),
        sql`${personId} in (${threads.openedBy}, ${revisions.authorId})`,
      ),
    )
    .orderBy(asc(last.createdAt))
    .limit(most);
}

const telling = [
  'revision.posted',
  'revision.withdrawn',
  'revision.locked',
  'revision.released',
  'revision.recalled',
  'revision.retired',
  'gate.signed',
  'gate.returned',
  'check.finished',
  'finding.waived',
  'thread.opened',
  'note.posted',
];

/** What happened lately, everywhere that this person may look. */
export async function recentEntries(tx: TenantTx, personId: string, limit: number) {
  return tx
    .select({ entry: auditEntries, workspaceName: workspaces.name, workspaceSlug: workspaces.slug })
    .from(auditEntries)
    .innerJoin(workspaces, eq(workspaces.id, auditEntries.workspaceId))
    .innerJoin(members, and(eq(members.workspaceId, workspaces.id), eq(members.userId, personId)))
    .where(inArray(auditEntries.action, telling))
    .orderBy(desc(auditEntries.at), desc(auditEntries.seq))
    .limit(limit);
}

export async function numbersAcross(tx: TenantTx, personId: string, templateIds: string[]) {
  if (!templateIds.length) return new Map<string, string>();
  const rows = await tx
    .select({ id: templates.id, number: templates.number })
    .from(templates)
    .innerJoin(members, and(eq(members.workspaceId, templates.workspaceId), eq(members.userId, personId)))
    .where(inArray(templates.id, templateIds));
  return new Map(rows.map((row) => [row.id, row.number]));
}
