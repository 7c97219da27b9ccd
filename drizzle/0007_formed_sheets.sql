ALTER TABLE "derivatives" DROP CONSTRAINT "derivatives_kind";--> statement-breakpoint
ALTER TABLE "derivatives" ADD COLUMN "recipe_digest" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "derivatives" ADD CONSTRAINT "derivatives_kind" UNIQUE("workspace_id","mesh_id","kind","recipe_digest");