import { personRoute } from '@/lib/http/route';
import { viewToday } from '@/lib/review/view-today';

export const GET = personRoute({}, ({ ctx }) => viewToday(ctx));
