import { workspaceRoute } from '@/lib/http/route';
import { exportActivity } from '@/lib/review/export-activity';
import { ExportActivityInput } from '@/lib/review/schemas';
import { contentDisposition } from '@/lib/storage/content-disposition';

export const GET = workspaceRoute({ query: ExportActivityInput }, async ({ ctx, query }) => {
  const { fileName, type, body } = await exportActivity(ctx, query);
  return new Response(body, {
    headers: {
      'content-type': type,
      'content-disposition': contentDisposition(fileName),
      'cache-control': 'private, no-store',
    },
  });
});
