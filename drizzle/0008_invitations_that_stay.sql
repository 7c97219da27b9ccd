-- What an invitation gives, and to whom, stands from the moment it is sent: neither role may write those columns.
revoke update on invitations, studio_invitations from firstpull_app, firstpull_auth;
--> statement-breakpoint
grant update (status) on invitations, studio_invitations to firstpull_app, firstpull_auth;
--> statement-breakpoint
-- And it is settled once.
create function invitation_settled_once() returns trigger
  language plpgsql set search_path = public, pg_catalog, pg_temp
  as $$
begin
  if old.status <> 'pending' and new.status <> old.status then
    raise exception 'an invitation that is % cannot become %', old.status, new.status
      using errcode = '23514', constraint = 'invitation_life';
  end if;
  return new;
end $$;
--> statement-breakpoint
create trigger invitation_settled_once before update on invitations
  for each row execute function invitation_settled_once();
--> statement-breakpoint
create trigger invitation_settled_once before update on studio_invitations
  for each row execute function invitation_settled_once();
