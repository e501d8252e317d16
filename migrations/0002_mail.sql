CREATE TABLE "mail_delivery" (
	"id" text PRIMARY KEY NOT NULL,
	"team_id" text,
	"recipient" text NOT NULL,
	"kind" text NOT NULL,
	"subject" text NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"last_error" text,
	"sealed" text,
	"valid_until" timestamp with time zone,
	"held_until" timestamp with time zone,
	"message_id" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"sent_at" timestamp with time zone,
	CONSTRAINT "mail_delivery_message_id_unique" UNIQUE("message_id"),
	CONSTRAINT "mail_delivery_state_known" CHECK ("mail_delivery"."state" in ('queued', 'failed', 'sent', 'given up')),
	CONSTRAINT "mail_delivery_sealed_while_open" CHECK (("mail_delivery"."state" in ('queued', 'failed')) = ("mail_delivery"."sealed" is not null)),
	CONSTRAINT "mail_delivery_sent_at" CHECK (("mail_delivery"."state" = 'sent') = ("mail_delivery"."sent_at" is not null)),
	CONSTRAINT "mail_delivery_attempts_count" CHECK ("mail_delivery"."attempts" >= 0)
);
--> statement-breakpoint
ALTER TABLE "mail_delivery" ADD CONSTRAINT "mail_delivery_team_id_team_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."team"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "mail_delivery_team_id_created_at_idx" ON "mail_delivery" USING btree ("team_id","created_at");--> statement-breakpoint
CREATE INDEX "mail_delivery_open_idx" ON "mail_delivery" USING btree ("created_at") WHERE "mail_delivery"."state" in ('queued', 'failed');