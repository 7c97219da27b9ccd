import { z } from 'zod';

const recipient = z.object({ email: z.email(), name: z.string() });
/** A member of a workspace: whether they still are is read again when the mail is sent. */
const memberRecipient = recipient.extend({ personId: z.uuid() });
const revisionRef = {
  workspaceId: z.uuid(),
  workspaceName: z.string(),
  number: z.string(),
  title: z.string(),
  letter: z.string(),
  /** Path on our own host, e.g. `/w/quillon/templates/…`. */
  path: z.string().startsWith('/'),
};

/** Every mail that the product sends, by occasion; lib/mail renders text and HTML from these. */
export const mailRequest = z.discriminatedUnion('template', [
  z.object({ template: z.literal('verify-address'), to: recipient, url: z.url() }),
  z.object({ template: z.literal('reset-password'), to: recipient, url: z.url() }),
  z.object({
    template: z.literal('second-factor'),
    to: recipient,
    /** Turned on or off, all recovery codes made anew, or one of them used to sign in. */
    what: z.enum(['on', 'off', 'new-codes', 'code-spent']),
    codesLeft: z.number().int(),
  }),
  z.object({
    template: z.literal('invitation'),
    to: recipient,
    inviterName: z.string(),
    studioName: z.string(),
    workspaceName: z.string().nullable(),
    role: z.string(),
    path: z.string().startsWith('/'),
    expiresAt: z.iso.datetime(),
  }),
  z.object({
    template: z.literal('revision-posted'),
    to: memberRecipient,
    ...revisionRef,
    authorName: z.string(),
    note: z.string(),
    /** Letter of the revision in review that this one takes the place of. */
    replaces: z.string().nullable().default(null),
  }),
  z.object({
    template: z.literal('revision-checked'),
    to: memberRecipient,
    ...revisionRef,
    authorName: z.string(),
    note: z.string(),
    /** Findings to look at, and failing ones that a lead has waived. */
    look: z.number(),
    waived: z.number(),
    /** Checks that were not run; mails queued before they were counted have none. */
    notRun: z.number().default(0),
  }),
  z.object({
    template: z.literal('check-fails'),
    to: memberRecipient,
    ...revisionRef,
    /** Each check that fails, with the first sentence of what to change. */
    failing: z.array(z.object({ check: z.string(), remedy: z.string() })).min(1),
  }),
  z.object({
    template: z.literal('check-given-up'),
    to: memberRecipient,
    ...revisionRef,
    reason: z.string(),
  }),
  z.object({
    template: z.literal('revision-withdrawn'),
    to: memberRecipient,
    ...revisionRef,
    printedName: z.string(),
    reason: z.string(),
  }),
  z.object({
    template: z.literal('gate-waits'),
    to: memberRecipient,
    ...revisionRef,
    gateName: z.string(),
    openItems: z.number(),
    /** Last day for signing, in the workspace's zone. */
    dueOn: z.iso.date().nullable().default(null),
  }),
  z.object({
    template: z.literal('gate-due'),
    to: memberRecipient,
    ...revisionRef,
    gateName: z.string(),
    dueOn: z.iso.date(),
    when: z.enum(['tomorrow', 'today']),
    openItems: z.number(),
    /** Whom the reader signs for while they are away. */
    standsFor: z.string().nullable(),
  }),
  z.object({
    template: z.literal('gate-short'),
    to: memberRecipient,
    ...revisionRef,
    gateName: z.string(),
    needed: z.number(),
    have: z.number(),
    left: z.number(),
    /** The names are there, but not under what stands there now; left out in mails of before. */
    held: z.boolean().optional(),
  }),
  z.object({
    template: z.literal('stand-in-named'),
    to: memberRecipient,
    workspaceId: z.uuid(),
    workspaceName: z.string(),
    path: z.string().startsWith('/'),
    awayName: z.string(),
    fromOn: z.iso.date(),
    untilOn: z.iso.date(),
  }),
  z.object({
    template: z.literal('note-posted'),
    to: memberRecipient,
    ...revisionRef,
    authorName: z.string(),
    text: z.string(),
    mentioned: z.boolean(),
  }),
  z.object({
    template: z.literal('revision-signed'),
    to: memberRecipient,
    ...revisionRef,
    printedName: z.string(),
    role: z.string(),
    meaning: z.string(),
    signedAt: z.iso.datetime(),
    timeZone: z.string(),
    digest: z.string(),
    /** Whom the signer stood in for. */
    signedFor: z.string().nullable().default(null),
    locked: z.boolean(),
  }),
  z.object({
    template: z.literal('revision-returned'),
    to: memberRecipient,
    ...revisionRef,
    printedName: z.string(),
    role: z.string(),
    reason: z.string(),
  }),
  z.object({
    template: z.literal('revision-released'),
    to: memberRecipient,
    ...revisionRef,
    printedName: z.string(),
    note: z.string(),
    digest: z.string(),
  }),
  z.object({
    template: z.literal('revision-recalled'),
    to: memberRecipient,
    ...revisionRef,
    printedName: z.string(),
    reason: z.string(),
  }),
  z.object({
    template: z.literal('revision-retired'),
    to: memberRecipient,
    ...revisionRef,
    printedName: z.string(),
    reason: z.string(),
  }),
]);
export type MailRequest = z.infer<typeof mailRequest>;
