import { z } from 'zod';
import {
  ActivityPage,
  ChangeTemplateInput,
  ContentView,
  CreateTemplateInput,
  DocketView,
  DraftView,
  ExportActivityInput,
  ListActivityInput,
  ListTemplatesInput,
  NoteInput,
  OpenThreadInput,
  PartDoneInput,
  PostRevisionInput,
  PresignedParts,
  PresignPartsInput,
  ReasonInput,
  ReleaseInput,
  ReturnInput,
  RevisionSummary,
  RevisionView,
  SaveDraftInput,
  SettleInput,
  SignatureView,
  SignInput,
  StartUploadInput,
  TemplatePage,
  TemplateSummary,
  ThreadView,
  UploadUnitInput,
  UploadView,
  WaiveInput,
} from '@/lib/review/schemas';
import { TodayView } from '@/lib/review/today-schemas';
import type { Operation } from './operation';

const workspace = '/workspaces/{workspace}';
const template = `${workspace}/templates/{template}`;
const upload = `${workspace}/uploads/{upload}`;
const revision = `${workspace}/revisions/{revision}`;
const thread = `${workspace}/threads/{thread}`;
const gate = `${workspace}/gates/{gate}`;

const get = (path: string, summary: string, answer: z.ZodType): Operation => ({
  method: 'get',
  path,
  summary,
  answer,
});
const file = (name: string, summary: string): Operation => ({
  method: 'get',
  path: `${revision}/${name}`,
  summary: `${summary}; leads to a short-lived address of the store`,
  status: 307,
});
const post = (path: string, summary: string, more: Partial<Operation>): Operation => ({
  method: 'post',
  path,
  summary,
  ...more,
});

const ended = z.object({
  revisionId: z.uuid(),
  letter: z.string(),
  state: z.enum(['recalled', 'retired']),
  reason: z.string(),
});

/** Templates, drafts, uploads, revisions, docket, gates and releases. */
export const reviewOperations: Operation[] = [
  get('/today', 'What waits on me, across workspaces', TodayView),
  { ...get(`${workspace}/activity`, 'What was done, newest first', ActivityPage), query: ListActivityInput },
  {
    ...get(
      `${workspace}/activity/export`,
      'The whole record as a file: CSV in words, or JSON with hashes',
      z.string(),
    ),
    query: ExportActivityInput,
  },
  { ...get(`${workspace}/templates`, 'Templates of a workspace', TemplatePage), query: ListTemplatesInput },
  post(`${workspace}/templates`, 'Open a template', {
    body: CreateTemplateInput,
    status: 201,
    answer: TemplateSummary,
    idempotent: true,
  }),
  get(template, 'One template', TemplateSummary),
  {
    method: 'patch',
    path: template,
    summary: 'Change title or due date',
    body: ChangeTemplateInput,
    answer: TemplateSummary,
  },
  get(`${template}/draft`, 'The draft, made where there is none', DraftView),
  {
    method: 'put',
    path: `${template}/draft`,
    summary: 'Save the draft',
    body: SaveDraftInput,
    answer: DraftView,
  },
  {
    method: 'delete',
    path: `${template}/draft`,
    summary: 'Throw the draft away',
    answer: z.object({ discarded: z.boolean() }),
  },
  post(`${template}/uploads`, 'Begin sending a mesh', {
    body: StartUploadInput,
    status: 201,
    answer: UploadView,
  }),
  get(upload, 'State of an upload', UploadView),
  post(`${upload}/parts`, 'Addresses to send parts to', { body: PresignPartsInput, answer: PresignedParts }),
  post(`${upload}/parts/done`, 'A part has arrived at the store', {
    body: PartDoneInput,
    answer: UploadView,
  }),
  post(`${upload}/complete`, 'All parts have arrived', { answer: UploadView }),
  post(`${upload}/unit`, 'Read the file again, in another unit of length', {
    body: UploadUnitInput,
    answer: UploadView,
  }),
  post(`${upload}/cancel`, 'Give the upload up', { answer: UploadView }),
  get(`${template}/revisions`, 'Revisions of a template', z.array(RevisionSummary)),
  post(`${template}/revisions`, 'Post the draft as the next revision', {
    body: PostRevisionInput,
    status: 201,
    answer: z.object({ revisionId: z.uuid(), letter: z.string() }),
    idempotent: true,
  }),
  get(revision, 'A revision as its page shows it', RevisionView),
  get(`${revision}/docket`, 'Findings and notes', DocketView),
  get(`${revision}/content`, 'Exactly what a signer signs, with its digest', ContentView),
  get(`${revision}/report`, 'The report of the checks as stored', z.record(z.string(), z.unknown())),
  file('model', 'The compact model of the stage'),
  file('picture', 'A picture of the model'),
  file('thumbnail', 'A small picture'),
  file('sheet', 'The formed sheet as a surface with its thickness'),
  file('mesh', 'The mesh’s exact bytes'),
  file('pack', 'The release pack'),
  post(`${revision}/check`, 'Order a check again that was given up', {
    status: 202,
    answer: z.object({ jobId: z.uuid() }),
  }),
  post(`${revision}/pack`, 'Order a pack again whose building failed', {
    status: 202,
    answer: z.object({ jobId: z.uuid() }),
  }),
  post(`${revision}/threads`, 'Begin a thread with its first note', {
    body: OpenThreadInput,
    status: 201,
    answer: ThreadView,
    idempotent: true,
  }),
  post(`${thread}/notes`, 'Answer in a thread', { body: NoteInput, status: 201, answer: ThreadView }),
  {
    method: 'patch',
    path: thread,
    summary: 'Settle or reopen a thread',
    body: SettleInput,
    answer: ThreadView,
  },
  post(`${workspace}/findings/{finding}/waiver`, 'Waive a failing finding with a reason', {
    body: WaiveInput,
    status: 201,
    answer: DocketView,
  }),
  post(`${gate}/sign`, 'Sign a gate, with the password and the digest that was shown', {
    body: SignInput,
    status: 201,
    answer: z.object({ signature: SignatureView, gatePassed: z.boolean(), locked: z.boolean() }),
    idempotent: true,
  }),
  post(`${gate}/return`, 'Return the revision with a reason', {
    body: ReturnInput,
    status: 201,
    answer: SignatureView,
    idempotent: true,
  }),
  post(`${revision}/withdraw`, 'Take one’s own revision back', {
    body: ReasonInput,
    answer: z.object({ state: z.literal('withdrawn') }),
  }),
  post(`${revision}/release`, 'Release an approved revision', {
    body: ReleaseInput,
    status: 201,
    answer: z.object({
      id: z.uuid(),
      revisionId: z.uuid(),
      byName: z.string(),
      at: z.iso.datetime(),
      note: z.string(),
      contentDigest: z.string(),
    }),
    idempotent: true,
  }),
  post(`${revision}/recall`, 'Recall a release with a reason', { body: ReasonInput, answer: ended }),
  post(`${revision}/retire`, 'Retire a released template with a reason', {
    body: ReasonInput,
    answer: ended,
  }),
];
