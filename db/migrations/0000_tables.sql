CREATE TABLE "approvals" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"strategy_id" uuid NOT NULL,
	"machine_id" uuid NOT NULL,
	"grade_group" text NOT NULL,
	"gas" text NOT NULL,
	"thickness_min" integer NOT NULL,
	"thickness_max" integer NOT NULL,
	"approved_by" uuid NOT NULL,
	"approved_at" timestamp with time zone DEFAULT now() NOT NULL,
	"ended_at" timestamp with time zone,
	"ended_by" uuid,
	"ended_why" text,
	CONSTRAINT "approvals_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "approvals_end_is_whole" CHECK (("approvals"."ended_at" is null) = ("approvals"."ended_by" is null) and ("approvals"."ended_at" is null) = ("approvals"."ended_why" is null)),
	CONSTRAINT "approvals_ended_why" CHECK ("approvals"."ended_why" in ('superseded', 'withdrawn'))
);
--> statement-breakpoint
CREATE TABLE "corner_plans" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"thickness" double precision NOT NULL,
	"plate_temperature" double precision NOT NULL,
	"skeleton" jsonb NOT NULL,
	"overrides" jsonb NOT NULL,
	"temperature_limit" double precision NOT NULL,
	"corners" jsonb NOT NULL,
	"totals" jsonb NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	"changed_by" uuid NOT NULL,
	CONSTRAINT "corner_plans_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "corner_plans_thickness" CHECK ("corner_plans"."thickness" > 0 and "corner_plans"."thickness" <= 0.06)
);
--> statement-breakpoint
CREATE TABLE "files" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"key" text NOT NULL,
	"content_type" text NOT NULL,
	"bytes" bigint NOT NULL,
	"sha256" text NOT NULL,
	"stored_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "files_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "files_key_once" UNIQUE("key"),
	CONSTRAINT "files_sha256" CHECK ("files"."sha256" ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "files_bytes" CHECK ("files"."bytes" >= 0)
);
--> statement-breakpoint
CREATE TABLE "grades" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"grade_group" text NOT NULL,
	CONSTRAINT "grades_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "grades_name_once" UNIQUE("plant_id","name"),
	CONSTRAINT "grades_lengths" CHECK (length("grades"."name") between 1 and 120 and length("grades"."grade_group") between 1 and 120)
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"plant_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"key" text NOT NULL,
	"fingerprint" text NOT NULL,
	"status" integer NOT NULL,
	"answer_version" integer,
	"answer" jsonb,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_key" PRIMARY KEY("plant_id","user_id","key"),
	CONSTRAINT "idempotency_keys_length" CHECK (length("idempotency_keys"."key") between 1 and 255)
);
--> statement-breakpoint
CREATE TABLE "machine_revisions" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"machine_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"profile" jsonb NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"made_at" timestamp with time zone DEFAULT now() NOT NULL,
	"made_by" uuid NOT NULL,
	CONSTRAINT "machine_revisions_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "machine_revisions_number_once" UNIQUE("plant_id","machine_id","number"),
	CONSTRAINT "machine_revisions_of_machine" UNIQUE("plant_id","machine_id","id"),
	CONSTRAINT "machine_revisions_number_positive" CHECK ("machine_revisions"."number" > 0)
);
--> statement-breakpoint
CREATE TABLE "machines" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "machines_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "machines_name_once" UNIQUE("plant_id","name"),
	CONSTRAINT "machines_name_length" CHECK (length("machines"."name") between 1 and 120)
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"role" text NOT NULL,
	"may_approve" boolean DEFAULT false NOT NULL,
	"ended_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "memberships_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "memberships_person_once" UNIQUE("plant_id","user_id"),
	CONSTRAINT "memberships_role" CHECK ("memberships"."role" in ('operator', 'programmer', 'engineer', 'lead'))
);
--> statement-breakpoint
CREATE TABLE "nozzles" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"type" text NOT NULL,
	"diameter" double precision NOT NULL,
	CONSTRAINT "nozzles_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "nozzles_name_once" UNIQUE("plant_id","name"),
	CONSTRAINT "nozzles_type" CHECK ("nozzles"."type" in ('single', 'double')),
	CONSTRAINT "nozzles_diameter" CHECK ("nozzles"."diameter" > 0 and "nozzles"."diameter" < 0.1)
);
--> statement-breakpoint
CREATE TABLE "parts" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"file_name" text NOT NULL,
	"file_id" uuid NOT NULL,
	"answers" jsonb NOT NULL,
	"reading" jsonb NOT NULL,
	"width" double precision NOT NULL,
	"height" double precision NOT NULL,
	"outlines" integer NOT NULL,
	"holes" integer NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"added_at" timestamp with time zone DEFAULT now() NOT NULL,
	"added_by" uuid NOT NULL,
	CONSTRAINT "parts_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "parts_name_length" CHECK (length("parts"."name") between 1 and 120),
	CONSTRAINT "parts_file_name_length" CHECK (length("parts"."file_name") between 1 and 255)
);
--> statement-breakpoint
CREATE TABLE "plants" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "plants_name_length" CHECK (length("plants"."name") between 1 and 120)
);
--> statement-breakpoint
CREATE TABLE "plates" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"tag" text NOT NULL,
	"grade_id" uuid NOT NULL,
	"heat_number" text DEFAULT '' NOT NULL,
	"nominal_thickness" integer NOT NULL,
	"measured_thickness" integer,
	"surface" text NOT NULL,
	"certificate" text DEFAULT '' NOT NULL,
	"length" double precision,
	"width" double precision,
	"version" integer DEFAULT 1 NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	"changed_by" uuid NOT NULL,
	CONSTRAINT "plates_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "plates_tag_length" CHECK (length("plates"."tag") between 1 and 40),
	CONSTRAINT "plates_nominal_thickness" CHECK ("plates"."nominal_thickness" between 1000 and 60000),
	CONSTRAINT "plates_measured_thickness" CHECK ("plates"."measured_thickness" between 1000 and 60000),
	CONSTRAINT "plates_surface" CHECK ("plates"."surface" in ('bright', 'mill scale', 'rust', 'primer')),
	CONSTRAINT "plates_size" CHECK ("plates"."length" > 0 and "plates"."width" > 0)
);
--> statement-breakpoint
CREATE TABLE "record_heads" (
	"plant_id" uuid NOT NULL,
	"sequence" bigint NOT NULL,
	"hash" text NOT NULL,
	CONSTRAINT "record_heads_key" PRIMARY KEY("plant_id")
);
--> statement-breakpoint
CREATE TABLE "record" (
	"plant_id" uuid NOT NULL,
	"sequence" bigint DEFAULT 0 NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"actor_id" uuid,
	"event" text NOT NULL,
	"subject_kind" text NOT NULL,
	"subject_id" text NOT NULL,
	"facts" jsonb NOT NULL,
	"canonical" text DEFAULT '' NOT NULL,
	"previous_hash" text DEFAULT '' NOT NULL,
	"hash" text DEFAULT '' NOT NULL,
	CONSTRAINT "record_key" PRIMARY KEY("plant_id","sequence"),
	CONSTRAINT "record_event_length" CHECK (length("record"."event") between 1 and 80)
);
--> statement-breakpoint
CREATE TABLE "reports" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"machine_id" uuid NOT NULL,
	"plate_id" uuid,
	"kind" text NOT NULL,
	"words" text DEFAULT '' NOT NULL,
	"thickness" integer,
	"photo_file_id" uuid,
	"photo_width" integer,
	"photo_height" integer,
	"by_user" uuid NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"closed_at" timestamp with time zone,
	"closed_by" uuid,
	"closed_words" text,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "reports_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "reports_kind" CHECK ("reports"."kind" in ('erupted', 'not through', 'corner burnt', 'cut lost', 'nozzle or window damaged', 'something else')),
	CONSTRAINT "reports_words_length" CHECK (length("reports"."words") <= 4000),
	CONSTRAINT "reports_photo_is_whole" CHECK (("reports"."photo_file_id" is null) = ("reports"."photo_width" is null) and ("reports"."photo_file_id" is null) = ("reports"."photo_height" is null)),
	CONSTRAINT "reports_end_is_whole" CHECK (("reports"."closed_at" is null) = ("reports"."closed_by" is null) and ("reports"."closed_at" is null) = ("reports"."closed_words" is null))
);
--> statement-breakpoint
CREATE TABLE "requests" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"machine_id" uuid NOT NULL,
	"grade_group" text NOT NULL,
	"thickness" integer NOT NULL,
	"plate_id" uuid,
	"words" text DEFAULT '' NOT NULL,
	"by_user" uuid NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "requests_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "requests_thickness" CHECK ("requests"."thickness" between 1000 and 60000),
	CONSTRAINT "requests_words_length" CHECK (length("requests"."words") <= 4000)
);
--> statement-breakpoint
CREATE TABLE "reviews" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"revision_version" integer NOT NULL,
	"verdict" text NOT NULL,
	"by_user" uuid NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"words" text DEFAULT '' NOT NULL,
	CONSTRAINT "reviews_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "reviews_verdict" CHECK ("reviews"."verdict" in ('submitted', 'approved', 'returned', 'withdrawn', 'superseded')),
	CONSTRAINT "reviews_words_length" CHECK (length("reviews"."words") <= 4000)
);
--> statement-breakpoint
CREATE TABLE "revision_authors" (
	"plant_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"since" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "revision_authors_key" PRIMARY KEY("plant_id","revision_id","user_id")
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"token_hash" text NOT NULL,
	"user_id" uuid NOT NULL,
	"plant_id" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "sessions_token_once" UNIQUE("token_hash"),
	CONSTRAINT "sessions_token_hash" CHECK ("sessions"."token_hash" ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "sign_in_attempts" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "sign_in_attempts_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"account_key" text NOT NULL,
	"address_key" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "strategies" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	CONSTRAINT "strategies_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "strategies_name_once" UNIQUE("plant_id","name"),
	CONSTRAINT "strategies_name_length" CHECK (length("strategies"."name") between 1 and 120)
);
--> statement-breakpoint
CREATE TABLE "strategy_revisions" (
	"plant_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"strategy_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"content" jsonb NOT NULL,
	"machine_id" uuid NOT NULL,
	"machine_revision_id" uuid NOT NULL,
	"grade_group" text NOT NULL,
	"gas" text NOT NULL,
	"nozzle_id" uuid NOT NULL,
	"thickness_min" integer NOT NULL,
	"thickness_max" integer NOT NULL,
	"hottest_plate" double precision NOT NULL,
	"prediction" jsonb NOT NULL,
	"model_version" text NOT NULL,
	"core" jsonb NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	"changed_by" uuid NOT NULL,
	CONSTRAINT "strategy_revisions_key" PRIMARY KEY("plant_id","id"),
	CONSTRAINT "strategy_revisions_number_once" UNIQUE("plant_id","strategy_id","number"),
	CONSTRAINT "strategy_revisions_what_is_approved" UNIQUE("plant_id","id","strategy_id","machine_id","grade_group","gas","thickness_min","thickness_max"),
	CONSTRAINT "strategy_revisions_number_positive" CHECK ("strategy_revisions"."number" > 0),
	CONSTRAINT "strategy_revisions_state" CHECK ("strategy_revisions"."state" in ('draft', 'inReview', 'returned', 'approved', 'superseded', 'withdrawn')),
	CONSTRAINT "strategy_revisions_gas" CHECK ("strategy_revisions"."gas" = 'oxygen'),
	CONSTRAINT "strategy_revisions_thickness" CHECK ("strategy_revisions"."thickness_min" >= 1000 and "strategy_revisions"."thickness_min" < "strategy_revisions"."thickness_max" and "strategy_revisions"."thickness_max" <= 60000),
	CONSTRAINT "strategy_revisions_columns_are_content" CHECK (coalesce(("strategy_revisions"."content" ->> 'machineRevisionId')::uuid = "strategy_revisions"."machine_revision_id"
        and "strategy_revisions"."content" ->> 'gradeGroup' = "strategy_revisions"."grade_group"
        and "strategy_revisions"."content" ->> 'gas' = "strategy_revisions"."gas"
        and ("strategy_revisions"."content" ->> 'nozzleId')::uuid = "strategy_revisions"."nozzle_id"
        and ("strategy_revisions"."content" #>> '{thickness,min}')::integer = "strategy_revisions"."thickness_min"
        and ("strategy_revisions"."content" #>> '{thickness,max}')::integer = "strategy_revisions"."thickness_max"
        and ("strategy_revisions"."content" ->> 'hottestPlate')::double precision = "strategy_revisions"."hottest_plate", false))
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY NOT NULL,
	"mail" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "users_mail_once" UNIQUE("mail"),
	CONSTRAINT "users_mail_lower" CHECK ("users"."mail" = lower("users"."mail") and length("users"."mail") between 3 and 254),
	CONSTRAINT "users_name_length" CHECK (length("users"."name") between 1 and 120)
);
--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_are_what_the_revision_says" FOREIGN KEY ("plant_id","revision_id","strategy_id","machine_id","grade_group","gas","thickness_min","thickness_max") REFERENCES "public"."strategy_revisions"("plant_id","id","strategy_id","machine_id","grade_group","gas","thickness_min","thickness_max") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_approved_by" FOREIGN KEY ("plant_id","approved_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_ended_by" FOREIGN KEY ("plant_id","ended_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "corner_plans" ADD CONSTRAINT "corner_plans_part" FOREIGN KEY ("plant_id","part_id") REFERENCES "public"."parts"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "corner_plans" ADD CONSTRAINT "corner_plans_revision" FOREIGN KEY ("plant_id","revision_id") REFERENCES "public"."strategy_revisions"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "corner_plans" ADD CONSTRAINT "corner_plans_changed_by" FOREIGN KEY ("plant_id","changed_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "files" ADD CONSTRAINT "files_plant" FOREIGN KEY ("plant_id") REFERENCES "public"."plants"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "grades" ADD CONSTRAINT "grades_plant" FOREIGN KEY ("plant_id") REFERENCES "public"."plants"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_user" FOREIGN KEY ("plant_id","user_id") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machine_revisions" ADD CONSTRAINT "machine_revisions_machine" FOREIGN KEY ("plant_id","machine_id") REFERENCES "public"."machines"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machine_revisions" ADD CONSTRAINT "machine_revisions_made_by" FOREIGN KEY ("plant_id","made_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machines" ADD CONSTRAINT "machines_plant" FOREIGN KEY ("plant_id") REFERENCES "public"."plants"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_plant" FOREIGN KEY ("plant_id") REFERENCES "public"."plants"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_user" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "nozzles" ADD CONSTRAINT "nozzles_plant" FOREIGN KEY ("plant_id") REFERENCES "public"."plants"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_file" FOREIGN KEY ("plant_id","file_id") REFERENCES "public"."files"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_added_by" FOREIGN KEY ("plant_id","added_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "plates" ADD CONSTRAINT "plates_grade" FOREIGN KEY ("plant_id","grade_id") REFERENCES "public"."grades"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "plates" ADD CONSTRAINT "plates_changed_by" FOREIGN KEY ("plant_id","changed_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "record_heads" ADD CONSTRAINT "record_heads_plant" FOREIGN KEY ("plant_id") REFERENCES "public"."plants"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "record" ADD CONSTRAINT "record_plant" FOREIGN KEY ("plant_id") REFERENCES "public"."plants"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reports" ADD CONSTRAINT "reports_revision" FOREIGN KEY ("plant_id","revision_id") REFERENCES "public"."strategy_revisions"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reports" ADD CONSTRAINT "reports_machine" FOREIGN KEY ("plant_id","machine_id") REFERENCES "public"."machines"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reports" ADD CONSTRAINT "reports_plate" FOREIGN KEY ("plant_id","plate_id") REFERENCES "public"."plates"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reports" ADD CONSTRAINT "reports_photo" FOREIGN KEY ("plant_id","photo_file_id") REFERENCES "public"."files"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reports" ADD CONSTRAINT "reports_by" FOREIGN KEY ("plant_id","by_user") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reports" ADD CONSTRAINT "reports_closed_by" FOREIGN KEY ("plant_id","closed_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "requests" ADD CONSTRAINT "requests_machine" FOREIGN KEY ("plant_id","machine_id") REFERENCES "public"."machines"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "requests" ADD CONSTRAINT "requests_plate" FOREIGN KEY ("plant_id","plate_id") REFERENCES "public"."plates"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "requests" ADD CONSTRAINT "requests_by" FOREIGN KEY ("plant_id","by_user") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reviews" ADD CONSTRAINT "reviews_revision" FOREIGN KEY ("plant_id","revision_id") REFERENCES "public"."strategy_revisions"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reviews" ADD CONSTRAINT "reviews_by" FOREIGN KEY ("plant_id","by_user") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revision_authors" ADD CONSTRAINT "revision_authors_revision" FOREIGN KEY ("plant_id","revision_id") REFERENCES "public"."strategy_revisions"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revision_authors" ADD CONSTRAINT "revision_authors_user" FOREIGN KEY ("plant_id","user_id") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_membership" FOREIGN KEY ("plant_id","user_id") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "strategies" ADD CONSTRAINT "strategies_created_by" FOREIGN KEY ("plant_id","created_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "strategy_revisions" ADD CONSTRAINT "strategy_revisions_strategy" FOREIGN KEY ("plant_id","strategy_id") REFERENCES "public"."strategies"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "strategy_revisions" ADD CONSTRAINT "strategy_revisions_machine_revision" FOREIGN KEY ("plant_id","machine_id","machine_revision_id") REFERENCES "public"."machine_revisions"("plant_id","machine_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "strategy_revisions" ADD CONSTRAINT "strategy_revisions_nozzle" FOREIGN KEY ("plant_id","nozzle_id") REFERENCES "public"."nozzles"("plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "strategy_revisions" ADD CONSTRAINT "strategy_revisions_changed_by" FOREIGN KEY ("plant_id","changed_by") REFERENCES "public"."memberships"("plant_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "approvals_of_revision" ON "approvals" USING btree ("plant_id","revision_id");--> statement-breakpoint
CREATE INDEX "corner_plans_of_part" ON "corner_plans" USING btree ("plant_id","part_id");--> statement-breakpoint
CREATE INDEX "corner_plans_of_revision" ON "corner_plans" USING btree ("plant_id","revision_id");--> statement-breakpoint
CREATE INDEX "idempotency_keys_by_age" ON "idempotency_keys" USING btree ("at");--> statement-breakpoint
CREATE INDEX "memberships_by_user" ON "memberships" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "parts_newest" ON "parts" USING btree ("plant_id","added_at");--> statement-breakpoint
CREATE UNIQUE INDEX "plates_tag_once" ON "plates" USING btree ("plant_id",lower("tag"));--> statement-breakpoint
CREATE INDEX "record_by_subject" ON "record" USING btree ("plant_id","subject_id");--> statement-breakpoint
CREATE INDEX "reports_newest" ON "reports" USING btree ("plant_id","at");--> statement-breakpoint
CREATE INDEX "reports_open" ON "reports" USING btree ("plant_id","revision_id") WHERE "reports"."closed_at" is null;--> statement-breakpoint
CREATE INDEX "requests_newest" ON "requests" USING btree ("plant_id","at");--> statement-breakpoint
CREATE INDEX "reviews_of_revision" ON "reviews" USING btree ("plant_id","revision_id","at");--> statement-breakpoint
CREATE INDEX "sessions_by_user" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "sign_in_attempts_by_account" ON "sign_in_attempts" USING btree ("account_key","at");--> statement-breakpoint
CREATE INDEX "sign_in_attempts_by_address" ON "sign_in_attempts" USING btree ("address_key","at");--> statement-breakpoint
CREATE UNIQUE INDEX "strategy_revisions_one_draft" ON "strategy_revisions" USING btree ("plant_id","strategy_id") WHERE "strategy_revisions"."state" = 'draft';--> statement-breakpoint
CREATE UNIQUE INDEX "strategy_revisions_one_approved" ON "strategy_revisions" USING btree ("plant_id","strategy_id") WHERE "strategy_revisions"."state" = 'approved';--> statement-breakpoint
CREATE INDEX "strategy_revisions_in_review" ON "strategy_revisions" USING btree ("plant_id") WHERE "strategy_revisions"."state" = 'inReview';