CREATE TABLE "measure" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"name" text NOT NULL,
	"quantity" text NOT NULL,
	"component_id" text,
	"element" text,
	"over" text NOT NULL,
	"unit" text NOT NULL,
	"position" double precision NOT NULL,
	CONSTRAINT "measure_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "measure_quantity_known" CHECK ("measure"."quantity" in ('dryMassFraction', 'dryMoleFraction', 'elementMassFraction', 'groupMassRatio', 'groupMoleRatio')),
	CONSTRAINT "measure_over_known" CHECK ("measure"."over" in ('stream', 'group')),
	CONSTRAINT "measure_component_named" CHECK (("measure"."quantity" in ('dryMassFraction', 'dryMoleFraction')) = ("measure"."component_id" is not null)),
	CONSTRAINT "measure_element_named" CHECK (("measure"."quantity" = 'elementMassFraction') = ("measure"."element" is not null))
);
--> statement-breakpoint
CREATE TABLE "measure_part" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"measure_id" text NOT NULL,
	"side" text NOT NULL,
	"component_id" text NOT NULL,
	CONSTRAINT "measure_part_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "measure_part_side_known" CHECK ("measure_part"."side" in ('without', 'group', 'over')),
	CONSTRAINT "measure_part_in_place" CHECK ("measure_part"."id" = concat_ws('/', "measure_part"."measure_id", "measure_part"."side", "measure_part"."component_id"))
);
--> statement-breakpoint
ALTER TABLE "given" DROP CONSTRAINT "given_quantity_known";--> statement-breakpoint
ALTER TABLE "given" DROP CONSTRAINT "given_in_place";--> statement-breakpoint
ALTER TABLE "given" DROP CONSTRAINT "given_component_named";--> statement-breakpoint
ALTER TABLE "given" ADD COLUMN "measure_id" text;--> statement-breakpoint
ALTER TABLE "measure" ADD CONSTRAINT "measure_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measure" ADD CONSTRAINT "measure_component_id_fk" FOREIGN KEY ("book_id","component_id") REFERENCES "public"."component"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measure_part" ADD CONSTRAINT "measure_part_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measure_part" ADD CONSTRAINT "measure_part_measure_id_fk" FOREIGN KEY ("book_id","measure_id") REFERENCES "public"."measure"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measure_part" ADD CONSTRAINT "measure_part_component_id_fk" FOREIGN KEY ("book_id","component_id") REFERENCES "public"."component"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "measure_part_measure_id_idx" ON "measure_part" USING btree ("book_id","measure_id");--> statement-breakpoint
CREATE INDEX "measure_part_component_id_idx" ON "measure_part" USING btree ("book_id","component_id");--> statement-breakpoint
ALTER TABLE "given" ADD CONSTRAINT "given_measure_id_fk" FOREIGN KEY ("book_id","measure_id") REFERENCES "public"."measure"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "given_measure_id_idx" ON "given" USING btree ("book_id","measure_id");--> statement-breakpoint
ALTER TABLE "given" ADD CONSTRAINT "given_measure_named" CHECK (("given"."quantity" in ('dryMassFraction', 'dryMoleFraction', 'elementMassFraction', 'groupMassRatio', 'groupMoleRatio')) = ("given"."measure_id" is not null) and num_nonnulls("given"."component_id", "given"."measure_id") < 2);--> statement-breakpoint
ALTER TABLE "given" ADD CONSTRAINT "given_quantity_known" CHECK ("given"."quantity" in ('flow', 'componentFlow', 'massFlow', 'moleFlow', 'componentMassFlow', 'componentMoleFlow', 'volumeFlow', 'massFraction', 'moleFraction', 'dryMassFraction', 'dryMoleFraction', 'elementMassFraction', 'groupMassRatio', 'groupMoleRatio'));--> statement-breakpoint
ALTER TABLE "given" ADD CONSTRAINT "given_in_place" CHECK ("given"."id" = concat_ws('/', "given"."case_id", "given"."stream_id", "given"."quantity", coalesce("given"."component_id", "given"."measure_id", ''), "given"."instrument"));--> statement-breakpoint
ALTER TABLE "given" ADD CONSTRAINT "given_component_named" CHECK (("given"."quantity" in ('flow', 'massFlow', 'moleFlow', 'volumeFlow')) = ("given"."component_id" is null and "given"."measure_id" is null));