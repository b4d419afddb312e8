CREATE TABLE "house_rules" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"expression" text NOT NULL,
	"sentence" text NOT NULL,
	"blocks" boolean DEFAULT false NOT NULL,
	"ended_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"changed_by" uuid,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "house_rules_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "house_rules_expression_length" CHECK (length("house_rules"."expression") between 1 and 200),
	CONSTRAINT "house_rules_sentence_length" CHECK (length("house_rules"."sentence") between 1 and 300),
	CONSTRAINT "house_rules_version_positive" CHECK ("house_rules"."version" > 0)
);
--> statement-breakpoint
ALTER TABLE "strategy_revisions" ADD COLUMN "house_rules" jsonb;--> statement-breakpoint
ALTER TABLE "house_rules" ADD CONSTRAINT "house_rules_plant" FOREIGN KEY ("plant_id") REFERENCES "public"."plants"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "house_rules" ADD CONSTRAINT "house_rules_changed_by" FOREIGN KEY ("plant_id","changed_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "house_rules_expression_once" ON "house_rules" USING btree ("plant_id","expression") WHERE "house_rules"."ended_at" is null;--> statement-breakpoint
ALTER TABLE "strategy_revisions" ADD CONSTRAINT "strategy_revisions_keeps_what_blocks" CHECK ("strategy_revisions"."house_rules" is null or not jsonb_path_exists("strategy_revisions"."house_rules", '$[*] ? (@.blocks == true && @.state != "holds")'));--> statement-breakpoint
ALTER TABLE house_rules ENABLE ROW LEVEL SECURITY;
ALTER TABLE house_rules FORCE ROW LEVEL SECURITY;
CREATE POLICY own_plant ON house_rules USING (plant_id = (SELECT nullif(current_setting('app.plant_id', true), '')::uuid))
  WITH CHECK (plant_id = (SELECT nullif(current_setting('app.plant_id', true), '')::uuid));
-- Whoever founds a plant need not have named it in the transaction.
CREATE POLICY for_the_owner_to_found ON house_rules FOR INSERT TO CURRENT_USER WITH CHECK (true);
--> statement-breakpoint
-- A rule stays itself and moves on by one version at a time; once ended it stays as it is. It begins in force.
CREATE FUNCTION guard_house_rule() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog AS $$
BEGIN
  IF tg_op = 'INSERT' THEN
    IF new.ended_at IS NOT NULL OR new.version <> 1 THEN
      RAISE EXCEPTION 'a house rule begins in force, with its first version' USING ERRCODE = 'CP002';
    END IF;
    RETURN new;
  END IF;
  IF old.ended_at IS NOT NULL THEN
    RAISE EXCEPTION 'a house rule that ended stays as it was' USING ERRCODE = 'CP001';
  END IF;
  IF (new.plant_id, new.id) IS DISTINCT FROM (old.plant_id, old.id) OR new.version <> old.version + 1 THEN
    RAISE EXCEPTION 'a house rule stays itself and takes its next version' USING ERRCODE = 'CP001';
  END IF;
  IF new.changed_by IS NULL THEN
    RAISE EXCEPTION 'a house rule is changed by somebody' USING ERRCODE = 'CP002';
  END IF;
  RETURN new;
END $$;
--> statement-breakpoint
CREATE TRIGGER house_rules_guard BEFORE INSERT OR UPDATE ON house_rules FOR EACH ROW EXECUTE FUNCTION guard_house_rule();
CREATE TRIGGER house_rules_not_taken_away BEFORE DELETE ON house_rules FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER house_rules_not_emptied BEFORE TRUNCATE ON house_rules FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
-- What the rules said is kept with what was handed in. Otherwise as in 0001_guards.
CREATE OR REPLACE FUNCTION guard_revision() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog AS $$
BEGIN
  IF tg_op = 'INSERT' THEN
    IF new.state <> 'draft' THEN
      RAISE EXCEPTION 'a revision begins as a draft, not as %', new.state USING ERRCODE = 'CP002';
    END IF;
    RETURN new;
  END IF;
  IF tg_op = 'DELETE' THEN
    IF old.state <> 'draft' THEN
      RAISE EXCEPTION 'a revision that was handed in is kept' USING ERRCODE = 'CP001';
    END IF;
    RETURN old;
  END IF;
  IF (new.plant_id, new.id, new.strategy_id, new.number) IS DISTINCT FROM (old.plant_id, old.id, old.strategy_id, old.number) THEN
    RAISE EXCEPTION 'a revision stays itself' USING ERRCODE = 'CP001';
  END IF;
  IF (old.state <> 'draft' OR new.state <> old.state)
    AND (new.content, new.machine_id, new.machine_revision_id, new.grade_group, new.gas, new.nozzle_id, new.thickness_min,
         new.thickness_max, new.hottest_plate, new.prediction, new.model_version, new.core)
      IS DISTINCT FROM
        (old.content, old.machine_id, old.machine_revision_id, old.grade_group, old.gas, old.nozzle_id, old.thickness_min,
         old.thickness_max, old.hottest_plate, old.prediction, old.model_version, old.core) THEN
    RAISE EXCEPTION 'content never changes once handed in' USING ERRCODE = 'CP001';
  END IF;
  IF old.state <> 'draft' AND new.house_rules IS DISTINCT FROM old.house_rules THEN
    RAISE EXCEPTION 'what the house rules said never changes once handed in' USING ERRCODE = 'CP001';
  END IF;
  IF new.state <> old.state AND (old.state, new.state) NOT IN (
    ('draft', 'inReview'), ('inReview', 'approved'), ('inReview', 'returned'), ('approved', 'superseded'), ('approved', 'withdrawn')
  ) THEN
    RAISE EXCEPTION 'a revision does not go from % to %', old.state, new.state USING ERRCODE = 'CP002';
  END IF;
  RETURN new;
END $$;
--> statement-breakpoint
-- Every plant begins with the usual rules on the reserve, which its lead may rewrite or end.
CREATE FUNCTION found_house_rules() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  INSERT INTO public.house_rules (plant_id, id, expression, sentence) VALUES
    (new.id, gen_random_uuid(), 'reserveCold >= 2', 'The routine lasts at least twice as long as a cold plate needs.'),
    (new.id, gen_random_uuid(), 'reserveHot >= 2.2', 'On the hottest plate, whose pierces scatter more, the reserve is at least 2.2.');
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE TRIGGER plants_founded AFTER INSERT ON plants FOR EACH ROW EXECUTE FUNCTION found_house_rules();
--> statement-breakpoint
INSERT INTO house_rules (plant_id, id, expression, sentence)
SELECT plants.id, gen_random_uuid(), usual.expression, usual.sentence
FROM plants, (VALUES
  ('reserveCold >= 2', 'The routine lasts at least twice as long as a cold plate needs.'),
  ('reserveHot >= 2.2', 'On the hottest plate, whose pierces scatter more, the reserve is at least 2.2.')
) AS usual (expression, sentence);
