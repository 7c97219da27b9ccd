import { buildOpenapi } from '@/lib/http/openapi/build-openapi';

let document: string | undefined;

/** The description of the API; it holds nothing of any tenant, so anybody may read and keep it. */
export function GET(): Response {
  document ??= JSON.stringify(buildOpenapi());
  return new Response(document, {
    headers: { 'content-type': 'application/json; charset=utf-8', 'cache-control': 'public, max-age=300' },
  });
}
