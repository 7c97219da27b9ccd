CREATE TABLE "stand_ins" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"stand_in_id" uuid NOT NULL,
	"from_on" date NOT NULL,
	"until_on" date NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"ended_at" timestamp (3) with time zone,
	CONSTRAINT "stand_ins_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "stand_ins_span" CHECK (from_on <= until_on),
	CONSTRAINT "stand_ins_other" CHECK (person_id <> stand_in_id)
);
--> statement-breakpoint
ALTER TABLE "stand_ins" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "gates" ADD COLUMN "due_on" date;--> statement-breakpoint
ALTER TABLE "signatures" ADD COLUMN "signed_for_id" uuid;--> statement-breakpoint
ALTER TABLE "signatures" ADD COLUMN "signed_for_name" text;--> statement-breakpoint
ALTER TABLE "stand_ins" ADD CONSTRAINT "stand_ins_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stand_ins" ADD CONSTRAINT "stand_ins_person_id_users_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stand_ins" ADD CONSTRAINT "stand_ins_stand_in_id_users_id_fk" FOREIGN KEY ("stand_in_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "stand_ins_until" ON "stand_ins" USING btree ("workspace_id","until_on");--> statement-breakpoint
ALTER TABLE "signatures" ADD CONSTRAINT "signatures_signed_for_id_users_id_fk" FOREIGN KEY ("signed_for_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "gates_open" ON "gates" USING btree ("workspace_id") WHERE state = 'open';--> statement-breakpoint
ALTER TABLE "signatures" ADD CONSTRAINT "signatures_for_another" CHECK (signed_for_id <> signer_id);--> statement-breakpoint
CREATE POLICY "gates_relay" ON "gates" AS PERMISSIVE FOR ALL TO "firstpull_relay" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "stand_ins_tenant" ON "stand_ins" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
-- Row policies bind the table's owner too.
alter table stand_ins force row level security;
--> statement-breakpoint
-- Who signed for whom is on record: a span may be ended, never rewritten or removed.
create function guard_stand_in() returns trigger
  language plpgsql set search_path = public, pg_catalog, pg_temp
  as $$
begin
  if old.ended_at is not null
     or (new.id, new.workspace_id, new.person_id, new.stand_in_id, new.from_on, new.until_on, new.created_at)
     is distinct from (old.id, old.workspace_id, old.person_id, old.stand_in_id, old.from_on, old.until_on, old.created_at) then
    raise exception 'who stands in for whom is frozen; it can only be ended' using errcode = '23001', constraint = 'frozen';
  end if;
  return new;
end $$;
--> statement-breakpoint
create trigger guard_stand_in before update on stand_ins for each row execute function guard_stand_in();
--> statement-breakpoint
create trigger never_deleted before delete on stand_ins for each row execute function refuse_change();
--> statement-breakpoint
create trigger never_emptied before truncate on stand_ins for each statement execute function refuse_change();
--> statement-breakpoint
grant select, insert on stand_ins to firstpull_app;
--> statement-breakpoint
grant update (ended_at) on stand_ins to firstpull_app;
--> statement-breakpoint
-- The sweep finds the workspaces with an open gate; what the gate is about it reads as their job.
grant select (id, workspace_id, state) on gates to firstpull_relay;
