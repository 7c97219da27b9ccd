import type { EntryRow } from './activity-data';
import { checkName } from './check-words';
import { verdictTag } from './verdict-words';

export type Told = { text: string; path: string | null };
type Detail = Record<string, unknown>;
type Place = { slug: string; number: string };
type Subject = Pick<EntryRow, 'detail' | 'subjectKind' | 'subjectId'>;

const word = (value: unknown, fallback = '') => (typeof value === 'string' ? value : fallback);
const quoted = (value: unknown) => `"${word(value).slice(0, 140)}"`;
const list = (value: unknown) => (Array.isArray(value) ? value.map(String).join(', ') : '');
const checks = (ids: unknown) =>
  Array.isArray(ids) ? ids.map((id) => checkName(String(id))).join(', ') : '';
const verdictOf = ({ verdict }: Detail) => verdictTag[verdict as keyof typeof verdictTag] ?? word(verdict);
const revision = (d: Detail, at: Place) => `${at.number} revision ${word(d.letter, '?')}`;
const passed = (d: Detail) => (list(d.gatesPassed) ? `; passed: ${list(d.gatesPassed)}` : '');
const standingFor = ({ signedFor }: Detail) => (signedFor ? ` for ${word((signedFor as Detail).name)}` : '');
const changed = (d: Detail) => {
  const before = d.before as Detail;
  const after = d.after as Detail;
  const parts = [];
  if (before.title !== after.title) parts.push(`title to ${quoted(after.title)}`);
  if (before.dueOn !== after.dueOn)
    parts.push(after.dueOn ? `due date to ${word(after.dueOn)}` : 'due date to none');
  return parts.join(', ') || 'nothing';
};

/** What was done, for each action of the chain, as the end of a sentence that begins with the actor's name. */
const sentences: Record<string, (d: Detail, at: Place) => string> = {
  'workspace.opened': (d) => `opened the workspace ${word(d.name)}`,
  'gate-plan.changed': (d) =>
    `changed the gate plan to version ${String(d.number)}${list(d.changes) ? `: ${list(d.changes)}` : ''}`,
  'gate-plan.made': (d) => `set gate plan ${String(d.number)}`,
  'person.invited': (d) => `invited ${word(d.email)} as ${word(d.role)}`,
  'person.joined': (d) => `joined as ${word(d.role)}`,
  'person.removed': (d) => (d.left ? 'left the workspace' : `removed ${word(d.name)}`),
  'person.role-changed': (d) => `changed ${word(d.name)} from ${word(d.from)} to ${word(d.to)}`,
  'person.renamed': (d) => `changed their name from ${word(d.from)} to ${word(d.to)}`,
  'invitation.cancelled': (d) => `cancelled the invitation of ${word(d.email)}`,
  'template.created': (d) => `opened template ${word(d.number)} ${quoted(d.title)}`,
  'template.changed': (d, at) => `changed ${at.number}: ${changed(d)}`,
  'draft.opened': (d, at) => `began the next revision of ${at.number}`,
  'draft.discarded': (d, at) => `discarded the draft of ${at.number}`,
  'upload.started': (d, at) => `began to send ${word(d.fileName)} for ${at.number}`,
  'upload.completed': (d, at) => `sent ${word(d.fileName)} for ${at.number}`,
  'upload.cancelled': (d, at) => `cancelled ${word(d.fileName)} for ${at.number}`,
  'upload.read-again': (d, at) => `had ${word(d.fileName)} for ${at.number} read again, in ${word(d.to)}`,
  'upload.accepted': (d, at) => `read ${word(d.fileName)} for ${at.number}`,
  'upload.refused': (d, at) => `refused ${word(d.fileName)} for ${at.number}: ${word(d.message)}`,
  'revision.posted': (d, at) =>
    `posted ${revision(d, at)}${d.replaces ? ` in place of ${word(d.replaces)}` : ''}`,
  'revision.withdrawn': (d, at) => `withdrew ${revision(d, at)}: ${word(d.reason)}`,
  'revision.returned': (d, at) => `closed the review of ${revision(d, at)}, returned`,
  'revision.superseded': (d, at) => `marked ${revision(d, at)} superseded by ${word(d.by)}`,
  'revision.locked': (d, at) => `locked ${revision(d, at)}`,
  'revision.released': (d, at) => `released ${revision(d, at)} to production`,
  'revision.recalled': (d, at) => `recalled ${revision(d, at)}: ${word(d.reason)}`,
  'revision.retired': (d, at) => `retired ${revision(d, at)}: ${word(d.reason)}`,
  'pack.built': (d, at) => `built the release pack of ${revision(d, at)}`,
  'pack.failed': (d, at) => `could not build the release pack of ${revision(d, at)}`,
  'check.finished': (d, at) =>
    `checked ${revision(d, at)}: ${verdictOf(d)}${checks(d.failing) ? ` (${checks(d.failing)})` : ''}${passed(d)}`,
  'check.failed': (d, at) => `could not check ${revision(d, at)}: ${word(d.reason)}`,
  'check.ordered-again': (d, at) => `had ${revision(d, at)} checked again`,
  'finding.waived': (d, at) =>
    `waived the failing check "${checkName(word(d.checkId))}" on ${revision(d, at)}: ${word(d.reason)}${passed(d)}`,
  'thread.opened': (d, at) => `noted on ${revision(d, at)}: ${quoted(d.text)}`,
  'note.posted': (d, at) => `replied on ${revision(d, at)}: ${quoted(d.text)}`,
  'thread.settled': (d, at) => `settled an item on ${revision(d, at)}`,
  'thread.reopened': (d, at) => `opened an item on ${revision(d, at)} again`,
  'gate.signed': (d, at) =>
    `signed ${revision(d, at)} at ${word(d.gate)}${standingFor(d)}: ${quoted(d.meaning)}`,
  'gate.passed': (d, at) => `passed ${word(d.gate)} of ${revision(d, at)}: everybody has signed`,
  'stand-in.named': (d) =>
    `asked ${word(d.standInName)} to sign for them from ${word(d.fromOn)} to ${word(d.untilOn)}`,
  'stand-in.ended': (d) => `ended that ${word(d.standInName)} signs for ${word(d.personName)}`,
  'gate.returned': (d, at) => `returned ${revision(d, at)} at ${word(d.gate)}: ${word(d.reason)}`,
};

/** Every action that has words, for the test that no action is without. */
export const knownActions = Object.keys(sentences);

/** One entry in plain words, with the page that it leads to. */
export function tell(entry: Subject & Pick<EntryRow, 'action'>, at: Place): Told {
  const { detail } = entry;
  const say = sentences[entry.action];
  const text = say ? say(detail, at) : entry.action.replaceAll(/[.-]/g, ' ');
  return { text, path: pathOf(entry, at.slug) };
}

function pathOf(entry: Subject, slug: string): string | null {
  const { detail, subjectKind } = entry;
  const templateId = templateOf(entry);
  const letter = word(detail.letter);
  if (templateId) return `/w/${slug}/templates/${templateId}${letter ? `/${letter}` : ''}`;
  if (subjectKind === 'person' || subjectKind === 'invitation') return `/w/${slug}/people`;
  if (subjectKind === 'gate-plan' || subjectKind === 'stand-in') return `/w/${slug}/gate-plan`;
  return subjectKind === 'workspace' ? `/w/${slug}` : null;
}

/** Which template an entry speaks of: by its detail, or because it is the subject. */
export const templateOf = (entry: Subject): string | null =>
  word(entry.detail.templateId) || (entry.subjectKind === 'template' ? entry.subjectId : null);
