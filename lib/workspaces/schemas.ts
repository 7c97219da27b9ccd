import { z } from 'zod';
import { NewPassword } from '@/lib/auth/password-rules';
import { clientRoles, roles, studioRoles } from './role-names';

/** Inputs and outputs of people, invitations and workspaces. Browser-safe: one source for route, verb and form. */

const knownZone = (zone: string) => {
  try {
    return Boolean(new Intl.DateTimeFormat('en', { timeZone: zone }));
  } catch {
    return false;
  }
};

/** Printable text on one line. */
export const shortText = (what: string, max: number) =>
  z
    .string()
    .trim()
    .min(1, `Give ${what}.`)
    .max(max, `At most ${max} characters.`)
    .regex(
      /^[^\p{Cc}\p{Zl}\p{Zp}\u202A-\u202E\u2066-\u2069]*$/u,
      'One line of printable characters, please.',
    );

export const TimeZone = z.string().max(60).refine(knownZone, 'Give an IANA time zone, e.g. Europe/Lisbon.');

/** The zone that a browser names for a new person: one that we know, or universal time. */
export const zoneOrUtc = z
  .string()
  .optional()
  .catch(undefined)
  .transform((zone) => (TimeZone.safeParse(zone).success ? zone! : 'UTC'));

const email = z
  .email('Give an address such as name@example.com.')
  .max(254, 'At most 254 characters.')
  .transform((address) => address.toLowerCase());

/** Dynamic parts of paths. */
export const PersonParams = z.object({ person: z.uuid() });
export const InvitationParams = z.object({ invitation: z.uuid() });
/** The token of a mailed invitation link. */
export const TokenParams = z.object({ invitation: z.string().max(200) });

/** What a Pusher client sends for a channel, and for signing its socket in. */
export const SocketInput = z.object({ socket_id: z.string().max(100) });
export const ChannelInput = SocketInput.extend({ channel_name: z.string().max(300) });

export const CreateWorkspaceInput = z.object({
  name: shortText('the client’s name', 60),
  code: z
    .string()
    .trim()
    .regex(/^[A-Z]{2,4}$/, 'Two to four capitals; they begin every template number.'),
  timeZone: TimeZone.optional(),
});
export type CreateWorkspaceInput = z.infer<typeof CreateWorkspaceInput>;

export const InviteClientInput = z.object({
  email,
  role: z.enum(clientRoles, 'A client is a reviewer or an approver.'),
});
export type InviteClientInput = z.infer<typeof InviteClientInput>;

export const InviteStaffInput = z.object({
  email,
  role: z.enum(studioRoles, 'Staff are designer, lead or producer.'),
});
export type InviteStaffInput = z.infer<typeof InviteStaffInput>;

export const ClientRoleInput = InviteClientInput.pick({ role: true });
export const StaffRoleInput = InviteStaffInput.pick({ role: true });

/** Who is signed in sends nothing; who is new sends a name and a password. */
export const AcceptInvitationInput = z.object({
  name: shortText('your name, as it is printed beside a signature', 80).optional(),
  password: NewPassword.optional(),
  timeZone: zoneOrUtc,
});
export type AcceptInvitationInput = z.infer<typeof AcceptInvitationInput>;

export const UpdateMeInput = z
  .object({
    name: shortText('your name', 80),
    units: z.enum(['mm', 'in']),
    timeZone: TimeZone,
  })
  .partial()
  .refine((change) => Object.keys(change).length > 0, 'Give at least one of name, units, timeZone.');
export type UpdateMeInput = z.infer<typeof UpdateMeInput>;

export const PersonView = z.object({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  role: z.enum(roles),
  side: z.enum(['studio', 'client']),
  since: z.iso.datetime(),
});
export type PersonView = z.infer<typeof PersonView>;

export const PendingInvitationView = z.object({
  id: z.uuid(),
  email: z.string(),
  role: z.enum(roles),
  state: z.enum(['pending', 'expired']),
  expiresAt: z.iso.datetime(),
  invitedBy: z.string(),
});
export type PendingInvitationView = z.infer<typeof PendingInvitationView>;

export const PeopleView = z.object({
  people: z.array(PersonView),
  /** Empty for those who may not invite. */
  invitations: z.array(PendingInvitationView),
  mayInvite: z.boolean(),
});
export type PeopleView = z.infer<typeof PeopleView>;

export const WorkspaceView = z.object({
  id: z.uuid(),
  name: z.string(),
  slug: z.string(),
  code: z.string(),
  timeZone: z.string(),
  templates: z.number(),
  clients: z.number(),
  pendingInvitations: z.number(),
  openedAt: z.iso.datetime(),
});
export type WorkspaceView = z.infer<typeof WorkspaceView>;

export const InvitationView = z.object({
  workspaceName: z.string().nullable(),
  studioName: z.string(),
  role: z.enum(roles),
  email: z.string(),
  expiresAt: z.iso.datetime(),
  state: z.enum(['pending', 'accepted', 'expired', 'cancelled']),
  /** The invited address has an account: sign in to accept; otherwise give a name and a password. */
  hasAccount: z.boolean(),
});
export type InvitationView = z.infer<typeof InvitationView>;

export const MeView = z.object({
  person: z.object({
    id: z.uuid(),
    name: z.string(),
    email: z.string(),
    units: z.enum(['mm', 'in']),
    timeZone: z.string(),
  }),
  studios: z.array(z.object({ id: z.uuid(), name: z.string(), slug: z.string(), role: z.enum(studioRoles) })),
  workspaces: z.array(
    z.object({
      id: z.uuid(),
      name: z.string(),
      slug: z.string(),
      studioName: z.string(),
      role: z.enum(roles),
    }),
  ),
});
export type MeView = z.infer<typeof MeView>;
