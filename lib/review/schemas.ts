import { MAX_STEP_BYTES } from '@/lib/formability/parse/size-caps';
import { gateConditions } from '@/lib/workspaces/check-gate-plan';
import { z } from 'zod';

/**
 * Inputs and outputs of everything about templates, revisions, docket and gates. Browser-safe: the one
 * source for the verb, the route, the form and the client's hook.
 */

const id = z.uuid();
const instant = z.iso.datetime();
const point = z.tuple([z.number(), z.number(), z.number()]);

export const standing = z.enum([
  'draft',
  'in_review',
  'approved',
  'returned',
  'withdrawn',
  'released',
  'recalled',
  'superseded',
  'retired',
]);
export type Standing = z.infer<typeof standing>;
export const verdict = z.enum(['pass', 'caution', 'fail']);
export const lengthUnit = z.enum(['mm', 'cm', 'm', 'in', 'ft', 'micron']);

// Templates

/** Longer than the 25 characters that ISO 7200 advises for a title field (from memory): people paste whole names. */
export const longestTitle = 80;

export const CreateTemplateInput = z.object({
  title: z
    .string()
    .trim()
    .min(1, 'Give the template a title.')
    .max(longestTitle, `At most ${longestTitle} characters.`),
  dueOn: z.iso.date('Write the date as YYYY-MM-DD.').nullable().default(null),
});
export type CreateTemplateInput = z.infer<typeof CreateTemplateInput>;

export const ChangeTemplateInput = z.object({
  title: CreateTemplateInput.shape.title.optional(),
  dueOn: z.iso.date('Write the date as YYYY-MM-DD.').nullable().optional(),
  version: z.number().int(),
});
export type ChangeTemplateInput = z.infer<typeof ChangeTemplateInput>;

export const ListTemplatesInput = z.object({
  search: z.string().trim().max(80).default(''),
  standing: standing.optional(),
  sort: z.enum(['changed', 'number', 'title', 'due']).default('changed'),
  direction: z.enum(['asc', 'desc']).default('desc'),
  cursor: z.string().max(400).optional(),
  limit: z.coerce.number().int().min(1).max(100).default(25),
});
export type ListTemplatesInput = z.infer<typeof ListTemplatesInput>;

export const TemplateSummary = z.object({
  id,
  number: z.string(),
  title: z.string(),
  dueOn: z.iso.date().nullable(),
  /** State of the revision that counts: released before approved before in review before returned. */
  standing,
  standingRevisionId: id.nullable(),
  standingLetter: z.string().nullable(),
  /** A newer revision in review, or returned, while the template stands on an older one. */
  ahead: z.object({ id, letter: z.string(), standing }).nullable(),
  latestRevisionId: id.nullable(),
  latestLetter: z.string().nullable(),
  /** Of the revision that counts. */
  verdict: verdict.nullable(),
  /** Of the newer revision on its way, or else of the one that counts while it is not decided. */
  openMustSettle: z.number(),
  thumbnailUrl: z.string().nullable(),
  changedAt: instant,
  version: z.number(),
});
export type TemplateSummary = z.infer<typeof TemplateSummary>;

export const TemplatePage = z.object({
  items: z.array(TemplateSummary),
  nextCursor: z.string().nullable(),
  total: z.number(),
});
export type TemplatePage = z.infer<typeof TemplatePage>;

export const RevisionSummary = z.object({
  id,
  letter: z.string(),
  ordinal: z.number(),
  state: standing,
  stateReason: z.string().nullable(),
  stateAt: instant,
  postedAt: instant,
  authorName: z.string(),
  note: z.string(),
  verdict: verdict.nullable(),
});
export type RevisionSummary = z.infer<typeof RevisionSummary>;

// Uploads and drafts

export const StartUploadInput = z
  .object({
    fileName: z.string().trim().min(1).max(200),
    bytes: z.number().int().min(1, 'The file is empty.').max(500_000_000, 'At most 500 MB.'),
    /** When the file was last written, ms since 1970 in UTC, as the browser tells it. */
    lastModified: z.number().int().nullable().default(null),
    unit: lengthUnit.default('mm'),
  })
  // Told before anything is sent; whatever the name, the same cap is held again when the content is known.
  .refine(({ fileName, bytes }) => !/\.(step|stp)$/i.test(fileName) || bytes <= MAX_STEP_BYTES, {
    path: ['bytes'],
    error: `A STEP file may have at most ${MAX_STEP_BYTES / 1e6} MB. Export the template alone, or as 3MF or STL.`,
  });
export type StartUploadInput = z.infer<typeof StartUploadInput>;

/** Unit of length in which a file without one of its own is to be read. */
export const UploadUnitInput = z.object({ unit: lengthUnit });

export const UploadView = z.object({
  id,
  fileName: z.string(),
  bytes: z.number(),
  /** Sending goes on only with a file of this very time, where it is known. */
  lastModified: z.number().nullable(),
  unit: lengthUnit,
  partBytes: z.number(),
  partCount: z.number(),
  /** Numbers (from 1) of the parts that the store has. */
  partsDone: z.array(z.number()),
  state: z.enum(['sending', 'reading', 'ready', 'refused', 'cancelled']),
  refusal: z.object({ code: z.string(), message: z.string(), reasons: z.array(z.string()) }).nullable(),
  mesh: z
    .object({
      id,
      sha256: z.string(),
      format: z.enum(['stl-binary', 'stl-ascii', '3mf', 'step']),
      /** That it was read in: the file's own where it has one. */
      unit: lengthUnit,
      triangles: z.number(),
      boundsMm: z.object({ min: z.array(z.number()), max: z.array(z.number()) }),
    })
    .nullable(),
});
export type UploadView = z.infer<typeof UploadView>;

export const PresignPartsInput = z.object({
  parts: z.array(z.number().int().min(1).max(10_000)).min(1).max(20),
});
export const PresignedParts = z.object({
  parts: z.array(z.object({ number: z.number(), url: z.url(), bytes: z.number() })),
});
export const PartDoneInput = z.object({
  number: z.number().int().min(1).max(10_000),
  etag: z.string().min(1).max(100),
});

/** The recipe as a person edits it; the engine's own schema (lib/formability/recipe.ts) fills and checks it. */
export const SaveDraftInput = z.object({
  uploadId: id.nullable(),
  recipe: z.record(z.string(), z.unknown()),
  note: z.string().max(2000),
  version: z.number().int(),
});
export type SaveDraftInput = z.infer<typeof SaveDraftInput>;

export const DraftView = z.object({
  id,
  templateId: id,
  nextLetter: z.string(),
  recipe: z.record(z.string(), z.unknown()),
  note: z.string(),
  upload: UploadView.nullable(),
  version: z.number(),
  changedAt: instant,
  /** Who saved it last; whoever began it until then. */
  changedBy: z.object({ id, name: z.string() }),
});
export type DraftView = z.infer<typeof DraftView>;

export const PostRevisionInput = z.object({ version: z.number().int() });
export type PostRevisionInput = z.infer<typeof PostRevisionInput>;

// The revision as its page shows it

export const FindingView = z.object({
  id,
  checkId: z.string(),
  status: z.enum(['pass', 'caution', 'fail', 'not-run']),
  measured: z.number().nullable(),
  limit: z.number().nullable(),
  unit: z.string(),
  message: z.string(),
  remedy: z.string(),
  basis: z.object({ source: z.string(), kind: z.string() }),
  places: z.array(z.object({ at: point, areaMm2: z.number() })),
  waiver: z.object({ reason: z.string(), by: z.string(), at: instant }).nullable(),
  threadId: id.nullable(),
});
export type FindingView = z.infer<typeof FindingView>;

export const PinInput = z.object({
  at: point,
  normal: point,
  view: z
    .object({
      position: z.array(z.number()).length(3),
      target: z.array(z.number()).length(3),
      up: z.array(z.number()).length(3),
    })
    .nullable(),
});
export type PinInput = z.infer<typeof PinInput>;

export const NoteView = z.object({
  id,
  authorId: id,
  authorName: z.string(),
  body: z.record(z.string(), z.unknown()),
  text: z.string(),
  createdAt: instant,
});
export type NoteView = z.infer<typeof NoteView>;

export const ThreadView = z.object({
  id,
  openedOn: z.string(),
  findingId: id.nullable(),
  mustSettle: z.boolean(),
  afterApproval: z.boolean(),
  state: z.enum(['open', 'settled']),
  settledByName: z.string().nullable(),
  settledAt: instant.nullable(),
  pin: PinInput.nullable(),
  standing: z.enum(['placed', 'carried', 'kept', 'moved', 'lost', 'free']),
  distanceMm: z.number().nullable(),
  openedByName: z.string(),
  createdAt: instant,
  notes: z.array(NoteView),
  version: z.number(),
});
export type ThreadView = z.infer<typeof ThreadView>;

export const DocketView = z.object({
  revisionId: id,
  findings: z.array(FindingView),
  threads: z.array(ThreadView),
  /** What keeps the next gate shut: failing findings not waived, open threads that must be settled. */
  counts: z.object({ mustSettle: z.number(), look: z.number(), settled: z.number() }),
});
export type DocketView = z.infer<typeof DocketView>;

export const SignatureView = z.object({
  id,
  decision: z.enum(['sign', 'return']),
  printedName: z.string(),
  role: z.string(),
  meaning: z.string(),
  reason: z.string().nullable(),
  contentDigest: z.string(),
  signedAt: instant,
  timeZone: z.string(),
  /** Whom the signer stood in for, by the name of that day. */
  signedFor: z.string().nullable().optional(),
});
export type SignatureView = z.infer<typeof SignatureView>;

export const GateView = z.object({
  id,
  ordinal: z.number(),
  key: z.string(),
  name: z.string(),
  kind: z.enum(['automatic', 'people']),
  meaning: z.string(),
  /** How many signatures close it; where everybody signs, as many as that is now. */
  quorum: z.number(),
  /** Everybody whom it asks has to sign. */
  everybody: z.boolean().optional(),
  /** What an automatic gate waits for. */
  conditions: z.array(z.enum(gateConditions)).optional(),
  /** Last day for signing; null before it opens and where the plan sets none. */
  dueOn: z.iso.date().nullable().optional(),
  state: z.enum(['waiting', 'open', 'passed', 'returned', 'closed']),
  openedAt: instant.nullable(),
  passedAt: instant.nullable(),
  signatures: z.array(SignatureView),
  /** Names of those whom an open gate asks and who have not signed; with who signs for them while they are away. */
  awaited: z.array(z.string()),
  /** Too few are left whom it asks: it cannot pass until somebody joins. */
  short: z.boolean().optional(),
  /** Whoever was missing has left, but an item is open, or what is there is not what the last name stands on. */
  held: z.boolean().optional(),
});
export type GateView = z.infer<typeof GateView>;

export const RevisionView = z.object({
  id,
  template: z.object({ id, number: z.string(), title: z.string(), dueOn: z.iso.date().nullable() }),
  letter: z.string(),
  state: standing,
  stateReason: z.string().nullable(),
  postedAt: instant,
  author: z.object({ id, name: z.string() }),
  note: z.string(),
  mesh: z.object({
    fileName: z.string(),
    bytes: z.number(),
    sha256: z.string(),
    triangles: z.number(),
    format: z.string(),
    unit: z.string(),
  }),
  recipe: z.record(z.string(), z.unknown()),
  check: z.object({
    state: z.enum(['queued', 'running', 'finished', 'failed']),
    stage: z.string().nullable(),
    progress: z.number(),
    verdict: verdict.nullable(),
    error: z.string().nullable(),
    finishedAt: instant.nullable(),
    engineVersion: z.string().nullable(),
    /** The changes of the recipe that buy most, each tried with all checks; costs are of printing. */
    advice: z
      .array(z.object({ text: z.string(), mends: z.array(z.string()), costS: z.number(), costG: z.number() }))
      .optional(),
    /** What limits the template, in words. */
    life: z.string().nullable().optional(),
  }),
  model: z
    .object({ url: z.string(), pictureUrl: z.string(), meta: z.record(z.string(), z.unknown()) })
    .nullable(),
  /** The formed sheet as a surface; null until it was formed, and for revisions checked before it was. */
  sheet: z.object({ url: z.string(), meta: z.record(z.string(), z.unknown()) }).nullable(),
  gates: z.array(GateView),
  /** Digest of the content as it stands now; equal to the signed one once locked. */
  contentDigest: z.string().nullable(),
  lockedAt: instant.nullable(),
  release: z
    .object({
      id,
      byName: z.string(),
      at: instant,
      note: z.string(),
      pack: z.object({ fileName: z.string(), bytes: z.number(), sha256: z.string() }).nullable(),
      /** The newest job that builds the pack, and why it was given up. */
      packJob: z
        .object({
          state: z.enum(['queued', 'running', 'done', 'failed', 'cancelled']),
          error: z.string().nullable(),
        })
        .nullable(),
    })
    .nullable(),
  siblings: z.array(z.object({ id, letter: z.string(), state: standing })),
  /** What the reader may do here and now; the server decides again when they do it. */
  can: z.object({
    note: z.boolean(),
    settle: z.boolean(),
    waive: z.boolean(),
    sign: z
      .object({
        gateId: id,
        gateName: z.string(),
        meaning: z.string(),
        /** Why signing would be refused at this moment, as a sentence; null when it would not. Returning is open. */
        blocked: z.string().nullable().optional(),
        /** Whom the reader would sign for, being their stand-in. */
        standsFor: z.string().nullable().optional(),
      })
      .nullable(),
    withdraw: z.boolean(),
    release: z.boolean(),
    /** Order the release pack again whose building failed. */
    rebuild: z.boolean(),
    recall: z.boolean(),
    retire: z.boolean(),
    download: z.boolean(),
    /** The exact bytes of the mesh; looking at the model is for everyone. */
    mesh: z.boolean().optional(),
    post: z.boolean(),
  }),
  version: z.number(),
});
export type RevisionView = z.infer<typeof RevisionView>;

// Docket commands

export const NoteInput = z.object({ clientKey: id, body: z.record(z.string(), z.unknown()) });
export const OpenThreadInput = NoteInput.extend({
  findingId: id.nullable().default(null),
  pin: PinInput.nullable().default(null),
  mustSettle: z.boolean().default(false),
});
export type OpenThreadInput = z.infer<typeof OpenThreadInput>;
export type NoteInput = z.infer<typeof NoteInput>;
export const SettleInput = z.object({ settled: z.boolean(), version: z.number().int() });
export const WaiveInput = z.object({
  reason: z.string().trim().min(10, 'Say why in at least ten characters: it stays on record.').max(1000),
});

// Gates

/** Exactly what a signer puts their name to. */
export const ContentView = z.object({
  digest: z.string(),
  content: z.record(z.string(), z.unknown()),
  summary: z.object({
    revision: z.string(),
    meshSha256: z.string(),
    meshFile: z.string(),
    meshBytes: z.number(),
    recipe: z.array(z.object({ label: z.string(), value: z.string() })),
    verdict: verdict.nullable(),
    findings: z.array(
      z.object({
        checkId: z.string(),
        status: z.string(),
        message: z.string(),
        waived: z.string().nullable(),
      }),
    ),
    openItems: z.array(z.string()),
    gatePlan: z.string(),
  }),
});
export type ContentView = z.infer<typeof ContentView>;

export const SignInput = z.object({
  digest: z.string().length(64),
  password: z.string().min(1, 'Type your password.').max(256),
  /** Of the authenticator, from who has a second factor. */
  code: z
    .string()
    .transform((code) => code.replace(/\s/g, ''))
    .pipe(z.string().regex(/^\d{6}$/, 'Type the six digits that your authenticator shows.'))
    .optional(),
});
export const ReturnInput = SignInput.extend({
  reason: z.string().trim().min(5, 'Say what must change.').max(2000),
});
export const ReasonInput = z.object({
  reason: z.string().trim().min(5, 'Give a reason; it stays on record.').max(2000),
});
export const ReleaseInput = z.object({ note: z.string().trim().max(2000).default('') });

// Activity

export const ListActivityInput = z.object({
  cursor: z.string().max(400).optional(),
  limit: z.coerce.number().int().min(1).max(100).default(50),
  about: z.enum(['agreement', 'revisions', 'docket', 'people']).optional(),
  /** Only what this person did. */
  by: id.optional(),
});
export type ListActivityInput = z.infer<typeof ListActivityInput>;
export const ExportActivityInput = z.object({ format: z.enum(['csv', 'json']).default('csv') });
export type ExportActivityInput = z.infer<typeof ExportActivityInput>;

export const ActivityPage = z.object({
  items: z.array(
    z.object({
      seq: z.number(),
      at: instant,
      actorId: id.nullable(),
      actorName: z.string(),
      action: z.string(),
      /** A whole sentence without the actor's name, e.g. "posted revision B of QLN-003". */
      text: z.string(),
      /** Page of what it is about, where there is one. */
      path: z.string().nullable(),
      /** Hash of the entry in the workspace's chain, lower-case hex. */
      hash: z.string(),
    }),
  ),
  nextCursor: z.string().nullable(),
});
export type ActivityPage = z.infer<typeof ActivityPage>;
