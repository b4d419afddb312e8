ALTER TABLE "corner_plans" ALTER COLUMN "part_id" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "corner_plans" ADD COLUMN "layout_id" uuid;--> statement-breakpoint
ALTER TABLE "corner_plans" ADD COLUMN "layout_version" integer;--> statement-breakpoint
ALTER TABLE "corner_plans" ADD CONSTRAINT "corner_plans_layout" FOREIGN KEY ("plant_id","layout_id","layout_version") REFERENCES "public"."layout_versions"("plant_id","layout_id","version") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "corner_plans_of_layout" ON "corner_plans" USING btree ("plant_id","layout_id");--> statement-breakpoint
ALTER TABLE "corner_plans" ADD CONSTRAINT "corner_plans_of_one" CHECK (("corner_plans"."part_id" is null) <> ("corner_plans"."layout_id" is null));--> statement-breakpoint
ALTER TABLE "corner_plans" ADD CONSTRAINT "corner_plans_layout_version" CHECK (("corner_plans"."layout_id" is null) = ("corner_plans"."layout_version" is null));