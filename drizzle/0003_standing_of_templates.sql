ALTER TABLE "templates" ADD COLUMN "standing_revision_id" uuid;--> statement-breakpoint
ALTER TABLE "templates" ADD COLUMN "standing_letter" text;--> statement-breakpoint
ALTER TABLE "templates" ADD COLUMN "latest_standing" text;--> statement-breakpoint
-- Fill them from the revisions that are there. Row policies bind the owner too, so they rest for these statements.
alter table templates no force row level security;
--> statement-breakpoint
alter table revisions no force row level security;
--> statement-breakpoint
update templates t set
    standing_revision_id = c.id, standing_letter = c.letter, standing = c.state, latest_standing = l.state
  from (
    select distinct on (workspace_id, template_id) workspace_id, template_id, id, letter, state
    from revisions
    order by workspace_id, template_id,
      case state when 'released' then 5 when 'approved' then 4 when 'in_review' then 3 when 'returned' then 2
        when 'withdrawn' then 0 else 1 end desc,
      ordinal desc
  ) c,
  revisions l
  where c.workspace_id = t.workspace_id and c.template_id = t.id
    and l.workspace_id = t.workspace_id and l.id = t.latest_revision_id;
--> statement-breakpoint
alter table templates force row level security;
--> statement-breakpoint
alter table revisions force row level security;
