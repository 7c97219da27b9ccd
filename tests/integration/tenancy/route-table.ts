import { startingLibrary } from '@/lib/studio/starting-library';
import type { Role } from '@/lib/workspaces/roles';

/** What one call names: objects of one workspace and studio. */
export type Names = {
  workspace: string;
  studio: string;
  template: string;
  /** In review, its studio gate open. */
  revision: string;
  /** Another one, released. */
  released: string;
  upload: string;
  thread: string;
  finding: string;
  gate: string;
  /** Client of the workspace. */
  client: string;
  /** Staff of the studio. */
  staff: string;
  /** Invitations that were taken back: their routes refuse, so that every cell meets the same state. */
  invitation: string;
  staffInvitation: string;
  sheet: string;
  /** The approver's, ended already. */
  standIn: string;
};

export type Verb = {
  /** Dynamic parts of the path beside `workspace` and `studio`, by the name of what they hold. */
  names?: Record<string, keyof Names>;
  /** Fixed dynamic parts. */
  fixed?: Record<string, string>;
  body?: unknown;
  form?: Record<string, string>;
  headers?: Record<string, string>;
  /** Roles that get past the permission; all others of the workspace are refused with 403 (clients of a studio: 404). */
  may: readonly Role[];
};
export type Scope = 'workspace' | 'studio' | 'person' | 'public';
export type Route = { scope: Scope; verbs: Record<string, Verb> };

const everyone: Role[] = ['designer', 'lead', 'producer', 'reviewer', 'approver'];
const staff: Role[] = ['designer', 'lead', 'producer'];
const makers: Role[] = ['designer', 'lead'];
const keepers: Role[] = ['lead', 'producer'];
const signers: Role[] = ['designer', 'lead', 'approver'];
const leads: Role[] = ['lead'];

const reason = 'It has to change, for the test.';
const password = 'not the password of anybody';
const digest = '0'.repeat(64);
const paragraph = {
  type: 'doc',
  content: [{ type: 'paragraph', content: [{ type: 'text', text: 'Words.' }] }],
};
const note = () => ({ clientKey: crypto.randomUUID(), body: paragraph });
/** A version that nothing has: who gets as far is told that somebody changed it meanwhile. */
const stale = 99_999;
const ifMatch = { 'if-match': `"${stale}"` };

const template = { template: 'template' } as const;
const revision = { revision: 'revision' } as const;
const released = { revision: 'released' } as const;
const upload = { upload: 'upload' } as const;
const w = (verbs: Route['verbs']): Route => ({ scope: 'workspace', verbs });
const s = (verbs: Route['verbs']): Route => ({ scope: 'studio', verbs });
const read = (names: Verb['names'], may: readonly Role[] = everyone): Route => w({ GET: { names, may } });

/**
 * Every route under app/api/v1 with its verbs: who may, and what it names. A route or verb that is not here
 * fails the test, and so does an entry without a route. Bodies are well-formed, and change nothing that a later
 * cell needs.
 */
export const routes: Record<string, Route> = {
  me: { scope: 'person', verbs: { GET: { may: everyone }, PATCH: { may: everyone, body: { units: 'mm' } } } },
  today: { scope: 'person', verbs: { GET: { may: everyone } } },
  studios: { scope: 'person', verbs: { POST: { may: everyone, body: { name: 'Opened in a test' } } } },
  realtime: { scope: 'person', verbs: { GET: { may: everyone } } },
  'realtime/sign-in': { scope: 'person', verbs: { POST: { may: everyone, form: { socket_id: '1.2' } } } },
  // Who may listen to what: authorize-channel.test.ts. This channel is refused to all.
  'realtime/authorize': {
    scope: 'person',
    verbs: { POST: { may: [], form: { socket_id: '1.2', channel_name: 'private-workspace-x' } } },
  },
  // Held by a mailed token, whoever is signed in: invitations.test.ts.
  'invitations/[invitation]': { scope: 'public', verbs: { GET: { may: [], fixed: { invitation: 'x' } } } },
  'invitations/[invitation]/accept': {
    scope: 'public',
    verbs: { POST: { may: [], fixed: { invitation: 'x' }, body: {} } },
  },

  'studios/[studio]/workspaces': s({
    GET: { may: staff },
    POST: { may: leads, body: { name: 'Client', code: 'TST' } },
  }),
  'studios/[studio]/people': s({ GET: { may: staff } }),
  'studios/[studio]/people/[person]': s({
    PATCH: { may: leads, names: { person: 'staff' }, body: { role: 'producer' } },
    // Names the last lead, whom nobody removes.
    DELETE: { may: leads, names: { person: 'staff' } },
  }),
  'studios/[studio]/invitations': s({
    POST: { may: leads, body: { email: 'staff.of.nobody@example.test', role: 'designer' } },
  }),
  'studios/[studio]/invitations/[invitation]': s({
    DELETE: { may: leads, names: { invitation: 'staffInvitation' } },
  }),
  'studios/[studio]/library': s({ GET: { may: staff } }),
  'studios/[studio]/library/[kind]': s({
    POST: {
      may: keepers,
      fixed: { kind: 'sheets' },
      body: { ...startingLibrary.sheets[0], name: 'Added in a test' },
    },
  }),
  'studios/[studio]/library/[kind]/[item]': s({
    PATCH: {
      may: keepers,
      fixed: { kind: 'sheets' },
      names: { item: 'sheet' },
      body: startingLibrary.sheets[0],
      headers: ifMatch,
    },
    DELETE: { may: keepers, fixed: { kind: 'sheets' }, names: { item: 'sheet' }, headers: ifMatch },
  }),
  'studios/[studio]/limits': s({ PUT: { may: leads, body: { limits: {} }, headers: ifMatch } }),

  'workspaces/[workspace]/people': w({ GET: { may: everyone } }),
  'workspaces/[workspace]/people/[person]': w({
    PATCH: { may: leads, names: { person: 'client' }, body: { role: 'reviewer' } },
    // Staff are refused to everybody here, so the cell changes nothing.
    DELETE: { may: leads, names: { person: 'staff' } },
  }),
  'workspaces/[workspace]/invitations': w({
    POST: { may: leads, body: { email: 'client.of.nobody@example.test', role: 'approver' } },
  }),
  'workspaces/[workspace]/invitations/[invitation]': w({
    DELETE: { may: leads, names: { invitation: 'invitation' } },
  }),
  'workspaces/[workspace]/gate-plan': w({
    GET: { may: everyone },
    PUT: {
      may: leads,
      body: {
        gates: [
          { kind: 'people', name: 'Client', roles: ['approver'], quorum: 1, meaning: 'Agreed, in a test.' },
        ],
      },
      headers: ifMatch,
    },
  }),
  'workspaces/[workspace]/stand-ins': w({
    GET: { may: everyone },
    // Names nobody of the workspace: who gets as far is told so.
    POST: {
      may: signers,
      body: {
        standInId: '0192f1c4-0000-7000-8000-000000000001',
        fromOn: '2126-01-01',
        untilOn: '2126-01-02',
      },
    },
  }),
  // Of those whose role allows it, the two whom it concerns and a lead.
  'workspaces/[workspace]/stand-ins/[standIn]': w({
    DELETE: { may: ['lead', 'approver'], names: { standIn: 'standIn' } },
  }),
  'workspaces/[workspace]/activity': w({ GET: { may: everyone } }),
  'workspaces/[workspace]/activity/export': w({ GET: { may: everyone } }),

  'workspaces/[workspace]/templates': w({
    GET: { may: everyone },
    POST: { may: makers, body: { title: 'From a test' } },
  }),
  'workspaces/[workspace]/templates/[template]': w({
    GET: { may: everyone, names: template },
    PATCH: { may: makers, names: template, body: { title: 'Renamed', version: stale } },
  }),
  'workspaces/[workspace]/templates/[template]/revisions': w({
    GET: { may: everyone, names: template },
    POST: { may: makers, names: template, body: { version: stale } },
  }),
  'workspaces/[workspace]/templates/[template]/draft': w({
    GET: { may: makers, names: template },
    PUT: {
      may: makers,
      names: template,
      body: { uploadId: null, recipe: {}, note: '', version: stale },
    },
    DELETE: { may: makers, names: template },
  }),
  'workspaces/[workspace]/templates/[template]/uploads': w({
    POST: { may: makers, names: template, body: { fileName: 'a.stl', bytes: 100 } },
  }),
  'workspaces/[workspace]/uploads/[upload]': read(upload, makers),
  // Of those whose role allows it, whoever began the upload.
  'workspaces/[workspace]/uploads/[upload]/parts': w({
    POST: { may: ['designer'], names: upload, body: { parts: [1] } },
  }),
  'workspaces/[workspace]/uploads/[upload]/parts/done': w({
    POST: { may: ['designer'], names: upload, body: { number: 1, etag: 'x' } },
  }),
  'workspaces/[workspace]/uploads/[upload]/complete': w({ POST: { may: ['designer'], names: upload } }),
  'workspaces/[workspace]/uploads/[upload]/unit': w({
    POST: { may: ['designer', 'lead'], names: upload, body: { unit: 'mm' } },
  }),
  'workspaces/[workspace]/uploads/[upload]/cancel': w({ POST: { may: ['designer', 'lead'], names: upload } }),

  'workspaces/[workspace]/revisions/[revision]': read(revision),
  'workspaces/[workspace]/revisions/[revision]/docket': read(revision),
  'workspaces/[workspace]/revisions/[revision]/content': read(revision),
  'workspaces/[workspace]/revisions/[revision]/report': read(revision),
  'workspaces/[workspace]/revisions/[revision]/model': read(revision),
  'workspaces/[workspace]/revisions/[revision]/picture': read(revision),
  'workspaces/[workspace]/revisions/[revision]/thumbnail': read(revision),
  'workspaces/[workspace]/revisions/[revision]/sheet': read(revision),
  'workspaces/[workspace]/revisions/[revision]/mesh': read(revision, [...signers, 'producer']),
  'workspaces/[workspace]/revisions/[revision]/threads': w({
    POST: { may: everyone, names: revision, body: note() },
  }),
  'workspaces/[workspace]/revisions/[revision]/withdraw': w({
    // Of those whose role allows it, the author alone; the lead of the test is not.
    POST: { may: ['designer'], names: released, body: { reason } },
  }),
  'workspaces/[workspace]/revisions/[revision]/release': w({
    POST: { may: keepers, names: revision, body: { note: '' } },
  }),
  'workspaces/[workspace]/revisions/[revision]/recall': w({
    POST: { may: keepers, names: revision, body: { reason } },
  }),
  'workspaces/[workspace]/revisions/[revision]/retire': w({
    POST: { may: keepers, names: revision, body: { reason } },
  }),
  // The checks of the test did not fail: whoever may is told so.
  'workspaces/[workspace]/revisions/[revision]/check': w({ POST: { may: makers, names: revision } }),
  'workspaces/[workspace]/revisions/[revision]/pack': w({
    GET: { may: [...signers, 'producer'], names: released },
    POST: { may: keepers, names: released },
  }),
  'workspaces/[workspace]/threads/[thread]': w({
    PATCH: { may: everyone, names: { thread: 'thread' }, body: { settled: true, version: stale } },
  }),
  'workspaces/[workspace]/threads/[thread]/notes': w({
    POST: { may: everyone, names: { thread: 'thread' }, body: note() },
  }),
  'workspaces/[workspace]/findings/[finding]/waiver': w({
    POST: { may: leads, names: { finding: 'finding' }, body: { reason } },
  }),
  'workspaces/[workspace]/gates/[gate]/sign': w({
    POST: { may: signers, names: { gate: 'gate' }, body: { digest, password } },
  }),
  'workspaces/[workspace]/gates/[gate]/return': w({
    POST: { may: signers, names: { gate: 'gate' }, body: { digest, password, reason } },
  }),
};
