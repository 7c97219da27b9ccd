import { uuidv7 } from 'uuidv7';
import { auth } from '@/lib/auth/auth';
import { isOpenPath } from '@/lib/auth/endpoints';
import { notFound } from '@/lib/errors/app-error';
import { problemResponse } from '@/lib/http/problem';
import { requireSameOrigin } from '@/lib/http/same-origin';

/** The identity service, behind the same rule for changes as every other route, and kept by no cache. */
async function handle(request: Request): Promise<Response> {
  try {
    const path = new URL(request.url).pathname.replace(/^\/api\/auth/, '');
    if (!isOpenPath(path)) throw notFound('address');
    if (request.method !== 'GET') requireSameOrigin(request);
    const answer = await auth().handler(request);
    const headers = new Headers(answer.headers);
    headers.set('cache-control', 'private, no-store');
    const wait = headers.get('x-retry-after');
    if (wait) headers.set('retry-after', wait);
    headers.delete('x-retry-after');
    return new Response(answer.body, { status: answer.status, headers });
  } catch (error) {
    return problemResponse(error, uuidv7());
  }
}

export { handle as GET, handle as POST };
