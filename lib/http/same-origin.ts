import { forbidden } from '@/lib/errors/app-error';
import { siteEnv } from '@/lib/env/env';

/** Refuses a change that another site's page asked for. A cookie alone never proves that we asked. */
export function requireSameOrigin(request: Request): void {
  const refuse = () =>
    forbidden('The request came from another site. Open Firstpull itself and try again.', 'cross-site');
  const site = request.headers.get('sec-fetch-site');
  if (site && site !== 'same-origin' && site !== 'none') throw refuse();
  const origin = request.headers.get('origin');
  if (origin ? origin !== new URL(siteEnv().APP_URL).origin : !site) throw refuse();
}
