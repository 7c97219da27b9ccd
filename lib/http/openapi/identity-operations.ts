import { z } from 'zod';
import {
  FilamentInput,
  LibraryView,
  LimitsView,
  MachineInput,
  OpenStudioInput,
  PrinterInput,
  SetLimitsInput,
  SheetInput,
} from '@/lib/studio/schemas';
import { NameStandInInput, StandInsView, StandInView } from '@/lib/review/stand-in-schemas';
import { ChangeGatePlanInput, GatePlanView } from '@/lib/workspaces/gate-plan-schemas';
import {
  AcceptInvitationInput,
  ChannelInput,
  ClientRoleInput,
  CreateWorkspaceInput,
  InvitationView,
  InviteClientInput,
  InviteStaffInput,
  MeView,
  PendingInvitationView,
  PeopleView,
  SocketInput,
  StaffRoleInput,
  UpdateMeInput,
  WorkspaceView,
} from '@/lib/workspaces/schemas';
import type { Operation } from './operation';

const studio = '/studios/{studio}';
const workspace = '/workspaces/{workspace}';
const item = z.union([MachineInput, PrinterInput, SheetInput, FilamentInput]);
const keptItem = z.union(
  [MachineInput, PrinterInput, SheetInput, FilamentInput].map((shelf) =>
    shelf.extend({ id: z.uuid(), version: z.number().int() }),
  ),
);
const signed = z.object({ auth: z.string(), channel_data: z.string().optional() });

/** People, studios, workspaces and the realtime server. */
export const identityOperations: Operation[] = [
  { method: 'get', path: '/me', summary: 'Who is signed in, and where they belong', answer: MeView },
  {
    method: 'patch',
    path: '/me',
    summary: 'Change one’s name, units or time zone',
    body: UpdateMeInput,
    answer: MeView.pick({ person: true }),
  },
  {
    method: 'post',
    path: '/studios',
    summary: 'Open a studio and become its first lead',
    body: OpenStudioInput,
    status: 201,
    answer: z.object({ id: z.uuid(), name: z.string(), slug: z.string(), timeZone: z.string() }),
  },
  {
    method: 'get',
    path: `${studio}/workspaces`,
    summary: 'The studio’s workspaces',
    answer: z.object({ workspaces: z.array(WorkspaceView) }),
  },
  {
    method: 'post',
    path: `${studio}/workspaces`,
    summary: 'Open a workspace for a client',
    body: CreateWorkspaceInput,
    status: 201,
    answer: WorkspaceView.pick({ id: true, name: true, slug: true, code: true, timeZone: true }),
  },
  { method: 'get', path: `${studio}/people`, summary: 'The studio’s staff', answer: PeopleView },
  {
    method: 'patch',
    path: `${studio}/people/{person}`,
    summary: 'Give staff another role',
    body: StaffRoleInput,
    status: 204,
  },
  {
    method: 'delete',
    path: `${studio}/people/{person}`,
    summary: 'Remove staff, or leave the studio',
    status: 204,
  },
  {
    method: 'post',
    path: `${studio}/invitations`,
    summary: 'Invite staff by mail',
    body: InviteStaffInput,
    status: 201,
    answer: PendingInvitationView,
  },
  {
    method: 'delete',
    path: `${studio}/invitations/{invitation}`,
    summary: 'Take an invitation of staff back',
    status: 204,
  },
  {
    method: 'get',
    path: `${studio}/library`,
    summary: 'Machines, printers, sheets, materials, limits',
    answer: LibraryView,
  },
  {
    method: 'post',
    path: `${studio}/library/{kind}`,
    summary: 'Add an item to a shelf of the library',
    body: item,
    status: 201,
    answer: keptItem,
  },
  {
    method: 'patch',
    path: `${studio}/library/{kind}/{item}`,
    summary: 'Change an item of the library',
    body: item,
    answer: keptItem,
    versioned: true,
  },
  {
    method: 'delete',
    path: `${studio}/library/{kind}/{item}`,
    summary: 'Remove an item from the library',
    status: 204,
    versioned: true,
  },
  {
    method: 'put',
    path: `${studio}/limits`,
    summary: 'Move the limits of the checks',
    body: SetLimitsInput,
    answer: LimitsView,
    versioned: true,
  },
  {
    method: 'get',
    path: `${workspace}/gate-plan`,
    summary: 'The gates that the next revision gets; the ETag is the version to change',
    answer: GatePlanView,
  },
  {
    method: 'put',
    path: `${workspace}/gate-plan`,
    summary: 'Make the next version of the gate plan; revisions in review keep theirs',
    body: ChangeGatePlanInput,
    answer: GatePlanView,
    versioned: true,
  },
  {
    method: 'get',
    path: `${workspace}/stand-ins`,
    summary: 'Who is away, now or soon, and who signs for them',
    answer: StandInsView,
  },
  {
    method: 'post',
    path: `${workspace}/stand-ins`,
    summary: 'Name who signs for oneself while away',
    body: NameStandInInput,
    status: 201,
    answer: StandInView,
  },
  {
    method: 'delete',
    path: `${workspace}/stand-ins/{standIn}`,
    summary: 'End that somebody signs for another',
    status: 204,
  },
  { method: 'get', path: `${workspace}/people`, summary: 'Everybody in a workspace', answer: PeopleView },
  {
    method: 'patch',
    path: `${workspace}/people/{person}`,
    summary: 'Make a client reviewer or approver',
    body: ClientRoleInput,
    status: 204,
  },
  {
    method: 'delete',
    path: `${workspace}/people/{person}`,
    summary: 'Remove a client, or leave the workspace',
    status: 204,
  },
  {
    method: 'post',
    path: `${workspace}/invitations`,
    summary: 'Invite a client by mail',
    body: InviteClientInput,
    status: 201,
    answer: PendingInvitationView,
  },
  {
    method: 'delete',
    path: `${workspace}/invitations/{invitation}`,
    summary: 'Take an invitation of a client back',
    status: 204,
  },
  {
    method: 'get',
    path: '/invitations/{invitation}',
    summary: 'What a mailed invitation is for; the part is its token',
    open: true,
    answer: InvitationView,
  },
  {
    method: 'post',
    path: '/invitations/{invitation}/accept',
    summary: 'Accept a mailed invitation; a new person gives a name and a password',
    open: true,
    body: AcceptInvitationInput,
    answer: z.object({ redirectTo: z.string() }),
  },
  {
    method: 'get',
    path: '/realtime',
    summary: 'Where the realtime server is',
    answer: z.object({ key: z.string(), host: z.string(), port: z.number().int(), tls: z.boolean() }),
  },
  {
    method: 'post',
    path: '/realtime/sign-in',
    summary: 'Sign a socket in as oneself',
    body: SocketInput,
    form: true,
    answer: z.object({ auth: z.string(), user_data: z.string() }),
  },
  {
    method: 'post',
    path: '/realtime/authorize',
    summary: 'Sign a subscription to a channel',
    body: ChannelInput,
    form: true,
    answer: signed,
  },
];
