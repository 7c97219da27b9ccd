import { studioRoute } from '@/lib/http/route';
import { readLibrary } from '@/lib/studio/read-library';

export const GET = studioRoute({}, ({ ctx }) => readLibrary(ctx));
