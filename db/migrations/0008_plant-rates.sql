CREATE TABLE "rates" (
	"plant_id" uuid NOT NULL,
	"currency" text DEFAULT '' NOT NULL,
	"machine_hour" double precision,
	"oxygen_kilogram" double precision,
	"electricity_kilowatt_hour" double precision,
	"wall_plug_efficiency" double precision DEFAULT 0.33 NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"changed_by" uuid,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "rates_key" PRIMARY KEY("plant_id"),
	CONSTRAINT "rates_currency_length" CHECK (length("rates"."currency") <= 12),
	CONSTRAINT "rates_machine_hour" CHECK ("rates"."machine_hour" between 0 and 1e9),
	CONSTRAINT "rates_oxygen_kilogram" CHECK ("rates"."oxygen_kilogram" between 0 and 1e9),
	CONSTRAINT "rates_electricity_kilowatt_hour" CHECK ("rates"."electricity_kilowatt_hour" between 0 and 1e9),
	CONSTRAINT "rates_wall_plug_efficiency" CHECK ("rates"."wall_plug_efficiency" > 0 and "rates"."wall_plug_efficiency" <= 1),
	CONSTRAINT "rates_name_their_currency" CHECK (length("rates"."currency") > 0 or coalesce("rates"."machine_hour", "rates"."oxygen_kilogram", "rates"."electricity_kilowatt_hour") is null),
	CONSTRAINT "rates_version_positive" CHECK ("rates"."version" > 0)
);
--> statement-breakpoint
ALTER TABLE "rates" ADD CONSTRAINT "rates_plant" FOREIGN KEY ("plant_id") REFERENCES "public"."plants"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rates" ADD CONSTRAINT "rates_changed_by" FOREIGN KEY ("plant_id","changed_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE rates ENABLE ROW LEVEL SECURITY;
ALTER TABLE rates FORCE ROW LEVEL SECURITY;
CREATE POLICY own_plant ON rates USING (plant_id = (SELECT nullif(current_setting('app.plant_id', true), '')::uuid))
  WITH CHECK (plant_id = (SELECT nullif(current_setting('app.plant_id', true), '')::uuid));
-- Whoever founds a plant need not have named it in the transaction.
CREATE POLICY for_the_owner_to_found ON rates FOR INSERT TO CURRENT_USER WITH CHECK (true);
--> statement-breakpoint
-- A plant's rates stay the plant's and move on by one version at a time; they begin empty.
CREATE FUNCTION guard_rates() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog AS $$
BEGIN
  IF tg_op = 'INSERT' THEN
    IF new.version <> 1 THEN
      RAISE EXCEPTION 'rates begin with their first version' USING ERRCODE = 'CP002';
    END IF;
    RETURN new;
  END IF;
  IF new.plant_id IS DISTINCT FROM old.plant_id OR new.version <> old.version + 1 THEN
    RAISE EXCEPTION 'rates stay their plant''s and take their next version' USING ERRCODE = 'CP001';
  END IF;
  IF new.changed_by IS NULL THEN
    RAISE EXCEPTION 'rates are changed by somebody' USING ERRCODE = 'CP002';
  END IF;
  RETURN new;
END $$;
--> statement-breakpoint
CREATE TRIGGER rates_guard BEFORE INSERT OR UPDATE ON rates FOR EACH ROW EXECUTE FUNCTION guard_rates();
CREATE TRIGGER rates_not_taken_away BEFORE DELETE ON rates FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER rates_not_emptied BEFORE TRUNCATE ON rates FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
-- Every plant has its row, empty at first.
CREATE FUNCTION found_rates() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  INSERT INTO public.rates (plant_id) VALUES (new.id);
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE TRIGGER plants_founded_rates AFTER INSERT ON plants FOR EACH ROW EXECUTE FUNCTION found_rates();
--> statement-breakpoint
INSERT INTO rates (plant_id) SELECT id FROM plants;
