CREATE TABLE "layout_versions" (
	"plant_id" uuid NOT NULL,
	"layout_id" uuid NOT NULL,
	"version" integer NOT NULL,
	"plate_id" uuid,
	"remnant_id" uuid,
	"width" double precision NOT NULL,
	"height" double precision NOT NULL,
	"kerf_width" double precision NOT NULL,
	"clearance" double precision NOT NULL,
	"edge_margin" double precision NOT NULL,
	"order_by" text NOT NULL,
	"cut_order" jsonb NOT NULL,
	"pieces" integer NOT NULL,
	"problems" jsonb NOT NULL,
	"more_problems" boolean NOT NULL,
	"travel" double precision NOT NULL,
	"cut_length" double precision NOT NULL,
	CONSTRAINT "layout_versions_key" PRIMARY KEY("plant_id","layout_id","version"),
	CONSTRAINT "layout_versions_one_outline" CHECK ("layout_versions"."plate_id" is null or "layout_versions"."remnant_id" is null),
	CONSTRAINT "layout_versions_size" CHECK ("layout_versions"."width" > 0 and "layout_versions"."height" > 0),
	CONSTRAINT "layout_versions_room" CHECK ("layout_versions"."kerf_width" >= 0 and "layout_versions"."clearance" >= 0 and "layout_versions"."edge_margin" >= 0),
	CONSTRAINT "layout_versions_order_by" CHECK ("layout_versions"."order_by" in ('computed', 'hand')),
	CONSTRAINT "layout_versions_pieces" CHECK ("layout_versions"."pieces" between 0 and 500)
);
--> statement-breakpoint
CREATE TABLE "layouts" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	"changed_by" uuid NOT NULL,
	CONSTRAINT "layouts_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "layouts_name_length" CHECK (length("layouts"."name") between 1 and 120),
	CONSTRAINT "layouts_version_positive" CHECK ("layouts"."version" > 0)
);
--> statement-breakpoint
CREATE TABLE "placements" (
	"plant_id" uuid NOT NULL,
	"layout_id" uuid NOT NULL,
	"version" integer NOT NULL,
	"number" integer NOT NULL,
	"part_id" uuid NOT NULL,
	"x" double precision NOT NULL,
	"y" double precision NOT NULL,
	"turn" double precision NOT NULL,
	"mirrored" boolean NOT NULL,
	CONSTRAINT "placements_key" PRIMARY KEY("plant_id","layout_id","version","number"),
	CONSTRAINT "placements_number" CHECK ("placements"."number" between 1 and 9999)
);
--> statement-breakpoint
ALTER TABLE "layout_versions" ADD CONSTRAINT "layout_versions_layout" FOREIGN KEY ("plant_id","layout_id") REFERENCES "public"."layouts"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "layout_versions" ADD CONSTRAINT "layout_versions_plate" FOREIGN KEY ("plant_id","plate_id") REFERENCES "public"."plates"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "layout_versions" ADD CONSTRAINT "layout_versions_remnant" FOREIGN KEY ("plant_id","remnant_id") REFERENCES "public"."parts"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "layouts" ADD CONSTRAINT "layouts_changed_by" FOREIGN KEY ("plant_id","changed_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "placements" ADD CONSTRAINT "placements_version" FOREIGN KEY ("plant_id","layout_id","version") REFERENCES "public"."layout_versions"("plant_id","layout_id","version") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "placements" ADD CONSTRAINT "placements_part" FOREIGN KEY ("plant_id","part_id") REFERENCES "public"."parts"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "layouts_newest" ON "layouts" USING btree ("plant_id","changed_at");--> statement-breakpoint
CREATE INDEX "placements_of_part" ON "placements" USING btree ("plant_id","part_id");--> statement-breakpoint
DO $$
DECLARE
  name text;
BEGIN
  FOREACH name IN ARRAY ARRAY['layouts', 'layout_versions', 'placements'] LOOP
    EXECUTE format('ALTER TABLE %I ENABLE ROW LEVEL SECURITY', name);
    EXECUTE format('ALTER TABLE %I FORCE ROW LEVEL SECURITY', name);
    EXECUTE format(
      'CREATE POLICY own_plant ON %I USING (plant_id = (SELECT nullif(current_setting(''app.plant_id'', true), '''')::uuid))
         WITH CHECK (plant_id = (SELECT nullif(current_setting(''app.plant_id'', true), '''')::uuid))',
      name
    );
    EXECUTE format('CREATE TRIGGER %I BEFORE TRUNCATE ON %I FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()', name || '_not_emptied', name);
  END LOOP;
END $$;
--> statement-breakpoint
-- A layout's newest version is there, at the latest when the transaction ends: each of the two names the other.
ALTER TABLE layouts ADD CONSTRAINT layouts_newest_version FOREIGN KEY (plant_id, id, version)
  REFERENCES layout_versions (plant_id, layout_id, version) DEFERRABLE INITIALLY DEFERRED;
--> statement-breakpoint
-- A layout stays itself and moves on by one version at a time.
CREATE FUNCTION guard_layout() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog AS $$
BEGIN
  IF (new.plant_id, new.id) IS DISTINCT FROM (old.plant_id, old.id) OR new.version <> old.version + 1 THEN
    RAISE EXCEPTION 'a layout stays itself and takes its next version' USING ERRCODE = 'CP001';
  END IF;
  RETURN new;
END $$;
--> statement-breakpoint
CREATE TRIGGER layouts_guard BEFORE UPDATE ON layouts FOR EACH ROW EXECUTE FUNCTION guard_layout();
CREATE TRIGGER layouts_not_taken_away BEFORE DELETE ON layouts FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER layout_versions_kept BEFORE UPDATE OR DELETE ON layout_versions FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER placements_kept BEFORE UPDATE OR DELETE ON placements FOR EACH ROW EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
-- A version holds as many pieces as it says: none can be laid on it afterwards.
CREATE FUNCTION pieces_as_said() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE
  said integer;
  found integer;
BEGIN
  SELECT pieces INTO said FROM public.layout_versions
    WHERE plant_id = new.plant_id AND layout_id = new.layout_id AND version = new.version;
  SELECT count(*) INTO found FROM public.placements
    WHERE plant_id = new.plant_id AND layout_id = new.layout_id AND version = new.version;
  IF said IS DISTINCT FROM found THEN
    RAISE EXCEPTION 'version % of layout % says % pieces and holds %', new.version, new.layout_id, said, found USING ERRCODE = 'CP002';
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER layout_versions_hold_what_they_say AFTER INSERT ON layout_versions
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION pieces_as_said();
CREATE CONSTRAINT TRIGGER placements_as_many_as_said AFTER INSERT ON placements
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION pieces_as_said();
