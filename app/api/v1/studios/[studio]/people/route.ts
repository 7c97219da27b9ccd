import { studioRoute } from '@/lib/http/route';
import { listStaff } from '@/lib/studio/list-staff';

export const GET = studioRoute({}, ({ ctx }) => listStaff(ctx));
