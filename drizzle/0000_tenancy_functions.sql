-- What the row policies ask. plpgsql, so that they may stand before the tables that they read.
-- Settings are local to the transaction; an unset one is NULL before its first use and '' after it.

create function app_setting(name text) returns uuid
  language sql stable parallel safe set search_path = pg_catalog, pg_temp
  as $$ select nullif(current_setting(name, true), '')::uuid $$;
--> statement-breakpoint
create function app_person() returns uuid
  language sql stable parallel safe set search_path = public, pg_catalog, pg_temp
  as $$ select app_setting('app.person') $$;
--> statement-breakpoint
-- Workspaces that this transaction may see: those of the person's memberships, narrowed to the named
-- workspace or studio; for background work the one workspace of the job.
create function app_workspaces() returns uuid[]
  language plpgsql stable security definer set search_path = public, pg_catalog, pg_temp
  as $$
declare
  job_workspace uuid := app_setting('app.job_workspace');
  person uuid := app_setting('app.person');
  named uuid := app_setting('app.workspace');
  studio uuid := app_setting('app.studio');
begin
  if job_workspace is not null then
    return array[job_workspace];
  elsif person is null then
    return '{}'::uuid[];
  elsif named is not null then
    return array(select m.workspace_id from members m where m.user_id = person and m.workspace_id = named);
  elsif studio is not null then
    return array(select m.workspace_id from members m join workspaces w on w.id = m.workspace_id
                 join studio_members s on s.studio_id = w.studio_id and s.user_id = person
                 where m.user_id = person and w.studio_id = studio);
  else
    return array(select m.workspace_id from members m where m.user_id = person);
  end if;
end $$;
--> statement-breakpoint
create function app_studios() returns uuid[]
  language plpgsql stable security definer set search_path = public, pg_catalog, pg_temp
  as $$
declare
  job_workspace uuid := app_setting('app.job_workspace');
  job_studio uuid := app_setting('app.job_studio');
  person uuid := app_setting('app.person');
  named uuid := app_setting('app.workspace');
  studio uuid := app_setting('app.studio');
begin
  if job_studio is not null then
    return array[job_studio];
  elsif job_workspace is not null then
    return array(select w.studio_id from workspaces w where w.id = job_workspace);
  elsif person is null then
    return '{}'::uuid[];
  elsif named is not null then
    return array(select s.studio_id from studio_members s join workspaces w on w.studio_id = s.studio_id
                 where s.user_id = person and w.id = named);
  else
    return array(select s.studio_id from studio_members s
                 where s.user_id = person and (studio is null or s.studio_id = studio));
  end if;
end $$;
--> statement-breakpoint
-- People whose name may be read: oneself, and whoever shares a visible workspace or studio.
create function app_people() returns uuid[]
  language plpgsql stable security definer set search_path = public, pg_catalog, pg_temp
  as $$
declare
  workspace_ids uuid[] := app_workspaces();
  studio_ids uuid[] := app_studios();
begin
  return array(
    select m.user_id from members m where m.workspace_id = any(workspace_ids)
    union
    select s.user_id from studio_members s where s.studio_id = any(studio_ids)
    union
    select app_person() where app_person() is not null);
end $$;
--> statement-breakpoint
create function studio_is_empty(candidate uuid) returns boolean
  language plpgsql stable security definer set search_path = public, pg_catalog, pg_temp
  as $$ begin return not exists (select 1 from studio_members s where s.studio_id = candidate); end $$;
