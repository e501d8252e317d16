-- As in 0001: what refers to what is settled when the whole change is there.
ALTER TABLE "given" ALTER CONSTRAINT "given_measure_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "measure" ALTER CONSTRAINT "measure_component_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "measure_part" ALTER CONSTRAINT "measure_part_measure_id_fk" DEFERRABLE INITIALLY DEFERRED;--> statement-breakpoint
ALTER TABLE "measure_part" ALTER CONSTRAINT "measure_part_component_id_fk" DEFERRABLE INITIALLY DEFERRED;
