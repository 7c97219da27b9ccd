import { personFromHeaders } from '@/lib/auth/session';
import { signInCookies } from '@/lib/auth/sign-in-cookies';
import { json, publicRoute } from '@/lib/http/route';
import { acceptInvitation } from '@/lib/workspaces/accept-invitation';
import { AcceptInvitationInput, TokenParams } from '@/lib/workspaces/schemas';

/** A new person is signed in by the answer's cookies. */
export const POST = publicRoute(
  { params: TokenParams, body: AcceptInvitationInput },
  async ({ params, body, request }) => {
    const visitor = await personFromHeaders(request.headers);
    const { redirectTo, signIn } = await acceptInvitation(visitor, params.invitation, body);
    const answer = json({ redirectTo });
    if (signIn)
      for (const cookie of await signInCookies(signIn, request.headers))
        answer.headers.append('set-cookie', cookie);
    return answer;
  },
);
