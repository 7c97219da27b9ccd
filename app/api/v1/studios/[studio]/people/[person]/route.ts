import { noContent, studioRoute } from '@/lib/http/route';
import { changeStaffRole } from '@/lib/studio/change-staff-role';
import { removeStaff } from '@/lib/studio/remove-staff';
import { PersonParams, StaffRoleInput } from '@/lib/workspaces/schemas';

export const PATCH = studioRoute(
  { params: PersonParams, body: StaffRoleInput },
  async ({ ctx, params, body }) => {
    await changeStaffRole(ctx, params.person, body);
    return noContent();
  },
);
export const DELETE = studioRoute({ params: PersonParams }, async ({ ctx, params }) => {
  await removeStaff(ctx, params.person);
  return noContent();
});
