-- Row policies bind the tables' owner too.
do $$
declare t regclass;
begin
  for t in select c.oid::regclass from pg_class c
           where c.relnamespace = 'public'::regnamespace and c.relkind = 'r' and c.relrowsecurity loop
    execute format('alter table %s force row level security', t);
  end loop;
end $$;
--> statement-breakpoint
-- The questions of the policies are answered by the role that may read memberships whole.
grant create on schema public to firstpull_auth;
--> statement-breakpoint
alter function app_workspaces() owner to firstpull_auth;
--> statement-breakpoint
alter function app_studios() owner to firstpull_auth;
--> statement-breakpoint
alter function app_people() owner to firstpull_auth;
--> statement-breakpoint
alter function studio_is_empty(uuid) owner to firstpull_auth;
--> statement-breakpoint

-- Staff of a studio stand as members in every workspace of it, in the same transaction as the change.
create function staff_into_workspaces() returns trigger
  language plpgsql security definer set search_path = public, pg_catalog, pg_temp
  as $$
begin
  if tg_op = 'DELETE' or tg_op = 'UPDATE' then
    delete from members m using workspaces w
      where w.id = m.workspace_id and w.studio_id = old.studio_id and m.user_id = old.user_id
        and m.role in ('designer', 'lead', 'producer');
  end if;
  if tg_op = 'INSERT' or tg_op = 'UPDATE' then
    insert into members (id, workspace_id, user_id, role)
      select gen_random_uuid(), w.id, new.user_id, new.role from workspaces w where w.studio_id = new.studio_id;
  end if;
  return null;
end $$;
--> statement-breakpoint
create function workspace_gets_staff() returns trigger
  language plpgsql security definer set search_path = public, pg_catalog, pg_temp
  as $$
begin
  insert into members (id, workspace_id, user_id, role)
    select gen_random_uuid(), new.id, s.user_id, s.role from studio_members s where s.studio_id = new.studio_id;
  return null;
end $$;
--> statement-breakpoint
-- A studio is never left without a lead, whatever path removes or demotes one.
create function studio_keeps_a_lead() returns trigger
  language plpgsql security definer set search_path = public, pg_catalog, pg_temp
  as $$
begin
  if old.role = 'lead' and (tg_op = 'DELETE' or new.role <> 'lead') then
    perform 1 from studios where id = old.studio_id for update;
    if not exists (select 1 from studio_members s
                   where s.studio_id = old.studio_id and s.role = 'lead' and s.id <> old.id) then
      raise exception 'the last lead of a studio stays' using errcode = '23514', constraint = 'studio_keeps_a_lead';
    end if;
  end if;
  if tg_op = 'DELETE' then return old; end if;
  return new;
end $$;
--> statement-breakpoint
alter function staff_into_workspaces() owner to firstpull_auth;
--> statement-breakpoint
alter function workspace_gets_staff() owner to firstpull_auth;
--> statement-breakpoint
alter function studio_keeps_a_lead() owner to firstpull_auth;
--> statement-breakpoint
revoke create on schema public from firstpull_auth;
--> statement-breakpoint
create trigger staff_into_workspaces after insert or update or delete on studio_members
  for each row execute function staff_into_workspaces();
--> statement-breakpoint
create trigger studio_keeps_a_lead before update or delete on studio_members
  for each row execute function studio_keeps_a_lead();
--> statement-breakpoint
create trigger workspace_gets_staff after insert on workspaces
  for each row execute function workspace_gets_staff();
--> statement-breakpoint

-- Frozen tables: written once. The application's role has no right to change them either (grants below).
create function refuse_change() returns trigger
  language plpgsql set search_path = public, pg_catalog, pg_temp
  as $$ begin
  raise exception 'rows of % are frozen: % refused', tg_table_name, tg_op using errcode = '23001', constraint = 'frozen';
end $$;
--> statement-breakpoint
do $$
declare t text;
begin
  foreach t in array array['gate_plans', 'meshes', 'recipes', 'reports', 'findings', 'waivers', 'signatures', 'locks',
                           'releases', 'packs', 'derivatives', 'audit_entries', 'studio_entries'] loop
    execute format('create trigger frozen_row before update or delete on %I for each row execute function refuse_change()', t);
    execute format('create trigger frozen_all before truncate on %I for each statement execute function refuse_change()', t);
  end loop;
  foreach t in array array['revisions', 'gates', 'threads', 'placements', 'notes', 'check_runs', 'audit_heads'] loop
    execute format('create trigger never_deleted before delete on %I for each row execute function refuse_change()', t);
    execute format('create trigger never_emptied before truncate on %I for each statement execute function refuse_change()', t);
  end loop;
end $$;
--> statement-breakpoint

-- A revision's content never changes; its state moves along the edges of its life only.
create function guard_revision() returns trigger
  language plpgsql set search_path = public, pg_catalog, pg_temp
  as $$
begin
  if (new.id, new.workspace_id, new.template_id, new.ordinal, new.letter, new.mesh_id, new.recipe_id,
      new.gate_plan_id, new.note, new.author_id, new.author_name, new.posted_at)
     is distinct from
     (old.id, old.workspace_id, old.template_id, old.ordinal, old.letter, old.mesh_id, old.recipe_id,
      old.gate_plan_id, old.note, old.author_id, old.author_name, old.posted_at) then
    raise exception 'the content of a posted revision is frozen' using errcode = '23001', constraint = 'frozen';
  end if;
  if new.state <> old.state and (old.state, new.state) not in (
      ('in_review', 'approved'), ('in_review', 'returned'), ('in_review', 'withdrawn'),
      ('approved', 'released'), ('approved', 'superseded'),
      ('released', 'retired'), ('released', 'recalled'), ('released', 'superseded')) then
    raise exception 'a revision cannot go from % to %', old.state, new.state
      using errcode = '23514', constraint = 'revision_life';
  end if;
  if new.state = 'approved' and old.state <> 'approved'
     and not exists (select 1 from locks l where l.workspace_id = new.workspace_id and l.revision_id = new.id) then
    raise exception 'a revision is approved only with its lock' using errcode = '23514', constraint = 'revision_life';
  end if;
  return new;
end $$;
--> statement-breakpoint
create trigger guard_revision before update on revisions for each row execute function guard_revision();
--> statement-breakpoint

-- After the lock nothing joins or leaves what was agreed.
create function refuse_when_locked() returns trigger
  language plpgsql set search_path = public, pg_catalog, pg_temp
  as $$
begin
  if exists (select 1 from locks l where l.workspace_id = new.workspace_id and l.revision_id = new.revision_id) then
    raise exception 'the revision is locked: % on % refused', tg_op, tg_table_name
      using errcode = '23001', constraint = 'locked';
  end if;
  return new;
end $$;
--> statement-breakpoint
do $$
declare t text;
begin
  foreach t in array array['findings', 'waivers', 'signatures', 'gates', 'check_runs'] loop
    execute format('create trigger refuse_when_locked before insert or update on %I for each row execute function refuse_when_locked()', t);
  end loop;
end $$;
--> statement-breakpoint
-- Threads and notes of a locked docket are frozen; what is said afterwards goes to threads marked so.
create function guard_docket() returns trigger
  language plpgsql set search_path = public, pg_catalog, pg_temp
  as $$
declare
  thread uuid;
  after_lock boolean;
begin
  -- One statement a table: an expression that names a column of the other table fails before it is evaluated.
  if tg_table_name = 'threads' then
    thread := new.id;
    after_lock := new.after_approval;
    if tg_op = 'UPDATE' and (new.after_approval, new.template_id, new.revision_id, new.finding_id, new.continues, new.opened_by)
       is distinct from (old.after_approval, old.template_id, old.revision_id, old.finding_id, old.continues, old.opened_by) then
      raise exception 'what a thread is about is frozen' using errcode = '23001', constraint = 'frozen';
    end if;
  else
    thread := new.thread_id;
    select t.after_approval into after_lock from threads t where t.workspace_id = new.workspace_id and t.id = thread;
  end if;
  if coalesce(after_lock, false) then return new; end if;
  if exists (select 1 from locks l where l.workspace_id = new.workspace_id and l.revision_id = new.revision_id)
     or exists (select 1 from placements p join locks l on l.workspace_id = p.workspace_id and l.revision_id = p.revision_id
                where p.workspace_id = new.workspace_id and p.thread_id = thread) then
    raise exception 'the docket of a locked revision is frozen: % on % refused', tg_op, tg_table_name
      using errcode = '23001', constraint = 'locked';
  end if;
  return new;
end $$;
--> statement-breakpoint
do $$
declare t text;
begin
  foreach t in array array['threads', 'notes', 'placements'] loop
    execute format('create trigger guard_docket before insert or update on %I for each row execute function guard_docket()', t);
  end loop;
end $$;
--> statement-breakpoint

-- Workers listen: a committed job or outbox row wakes them at once; their polling is the net beneath.
create function tell_workers() returns trigger
  language plpgsql set search_path = public, pg_catalog, pg_temp
  as $$ begin perform pg_notify('firstpull_work', tg_table_name); return null; end $$;
--> statement-breakpoint
create trigger tell_workers after insert on outbox for each statement execute function tell_workers();
--> statement-breakpoint
create trigger tell_workers after insert or update of state on jobs for each statement execute function tell_workers();
--> statement-breakpoint

-- Rights, table by table.
grant usage on schema public to firstpull_app, firstpull_auth, firstpull_relay;
--> statement-breakpoint
grant select, insert, update, delete on users, sessions, accounts, verifications, rate_limits, members, invitations,
  studio_invitations to firstpull_auth;
--> statement-breakpoint
grant select, update on studios, studio_members, workspaces to firstpull_auth;
--> statement-breakpoint
grant select (id, name, email, units, time_zone) on users to firstpull_app;
--> statement-breakpoint
grant select, insert, update on studios, workspaces, templates, uploads, jobs, check_runs, threads, placements, gates,
  invitations, studio_invitations, audit_heads, machines, printers, sheets, filaments, studio_limits to firstpull_app;
--> statement-breakpoint
grant select, insert, update, delete on studio_members, members, drafts, idempotency_keys to firstpull_app;
--> statement-breakpoint
grant delete on machines, printers, sheets, filaments to firstpull_app;
--> statement-breakpoint
grant select, insert on gate_plans, meshes, recipes, reports, derivatives, findings, waivers, signatures, locks,
  releases, packs, notes, audit_entries, studio_entries to firstpull_app;
--> statement-breakpoint
grant insert on outbox to firstpull_app, firstpull_auth;
--> statement-breakpoint
grant select, insert on revisions to firstpull_app;
--> statement-breakpoint
grant update (state, state_reason, state_at, version) on revisions to firstpull_app;
--> statement-breakpoint
grant select, update, delete on outbox to firstpull_relay;
--> statement-breakpoint
grant select (id, workspace_id, kind, state, attempt, lease_until, created_at) on jobs to firstpull_relay;
