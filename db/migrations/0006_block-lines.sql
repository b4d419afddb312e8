ALTER TABLE "machines" ADD COLUMN "block_unit" text DEFAULT 'mm' NOT NULL;--> statement-breakpoint
ALTER TABLE "machines" ADD COLUMN "block_header" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "machines" ADD COLUMN "block_footer" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "machines" ADD CONSTRAINT "machines_block_unit" CHECK ("machines"."block_unit" in ('mm', 'inch'));--> statement-breakpoint
ALTER TABLE "machines" ADD CONSTRAINT "machines_block_lines" CHECK (length("machines"."block_header") <= 2000 and length("machines"."block_footer") <= 2000
        and "machines"."block_header" !~ '[^\u0020-\u007e\n]' and "machines"."block_footer" !~ '[^\u0020-\u007e\n]');