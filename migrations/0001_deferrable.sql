-- A change creates, updates and removes records in one transaction: what refers to what, and which tag is whose, is
-- settled when it is all there. Drizzle's schema cannot say this, so it is said here.
ALTER TABLE "given" ALTER CONSTRAINT "given_case_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "given" ALTER CONSTRAINT "given_stream_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "given" ALTER CONSTRAINT "given_component_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "coefficient" ALTER CONSTRAINT "coefficient_reaction_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "coefficient" ALTER CONSTRAINT "coefficient_component_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "reaction" ALTER CONSTRAINT "reaction_unit_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule" ALTER CONSTRAINT "rule_unit_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule" ALTER CONSTRAINT "rule_stream_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule" ALTER CONSTRAINT "rule_component_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule" ALTER CONSTRAINT "rule_other_stream_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule" ALTER CONSTRAINT "rule_other_component_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule" ALTER CONSTRAINT "rule_reaction_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule" ALTER CONSTRAINT "rule_parameter_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule_stream" ALTER CONSTRAINT "rule_stream_rule_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule_stream" ALTER CONSTRAINT "rule_stream_stream_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "absence" ALTER CONSTRAINT "absence_stream_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "absence" ALTER CONSTRAINT "absence_component_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "inventory" ALTER CONSTRAINT "inventory_unit_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "inventory" ALTER CONSTRAINT "inventory_component_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "link" ALTER CONSTRAINT "link_stream_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "link" ALTER CONSTRAINT "link_unit_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "stream" ALTER CONSTRAINT "stream_difference_component_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "component" DROP CONSTRAINT "component_book_id_tag_key", ADD CONSTRAINT "component_book_id_tag_key" UNIQUE ("book_id","tag") DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "stream" DROP CONSTRAINT "stream_book_id_tag_key", ADD CONSTRAINT "stream_book_id_tag_key" UNIQUE ("book_id","tag") DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "unit" DROP CONSTRAINT "unit_book_id_tag_key", ADD CONSTRAINT "unit_book_id_tag_key" UNIQUE ("book_id","tag") DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "reaction" DROP CONSTRAINT "reaction_book_id_tag_key", ADD CONSTRAINT "reaction_book_id_tag_key" UNIQUE ("book_id","tag") DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "parameter" DROP CONSTRAINT "parameter_book_id_tag_key", ADD CONSTRAINT "parameter_book_id_tag_key" UNIQUE ("book_id","tag") DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "rule" DROP CONSTRAINT "rule_book_id_tag_key", ADD CONSTRAINT "rule_book_id_tag_key" UNIQUE ("book_id","tag") DEFERRABLE INITIALLY DEFERRED;
