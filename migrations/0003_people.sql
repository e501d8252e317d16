CREATE TABLE "attempt" (
	"key" text PRIMARY KEY NOT NULL,
	"count" integer NOT NULL,
	"since" timestamp with time zone DEFAULT now() NOT NULL
);--> statement-breakpoint
CREATE TABLE "two_factor" (
	"id" text PRIMARY KEY NOT NULL,
	"user_id" text NOT NULL,
	"secret" text NOT NULL,
	"backup_codes" text NOT NULL,
	"verified" boolean DEFAULT true NOT NULL,
	"failed_verification_count" integer DEFAULT 0 NOT NULL,
	"locked_until" timestamp with time zone,
	CONSTRAINT "two_factor_user_id_unique" UNIQUE("user_id")
);--> statement-breakpoint
CREATE TABLE "team_settings" (
	"team_id" text PRIMARY KEY NOT NULL,
	"mass_flow_unit" text DEFAULT 'kg/h' NOT NULL,
	"mole_flow_unit" text DEFAULT 'kmol/h' NOT NULL,
	"decimal" text DEFAULT 'own' NOT NULL,
	"flow_digits" integer,
	"fraction_digits" integer,
	"carried_digits" integer,
	"closure_limit" double precision DEFAULT 0.1 NOT NULL,
	"analysis_low" double precision DEFAULT 98 NOT NULL,
	"analysis_high" double precision DEFAULT 102 NOT NULL,
	"weak_limit" double precision DEFAULT 10 NOT NULL,
	"mail_domains" text[] DEFAULT '{}' NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "team_settings_decimal_known" CHECK ("team_settings"."decimal" in ('own', 'point', 'comma')),
	CONSTRAINT "team_settings_limits" CHECK ("team_settings"."closure_limit" > 0 and "team_settings"."weak_limit" > 0),
	CONSTRAINT "team_settings_analysis" CHECK (0 < "team_settings"."analysis_low" and "team_settings"."analysis_low" < "team_settings"."analysis_high")
);--> statement-breakpoint
CREATE TABLE "invitation_project" (
	"team_id" text NOT NULL,
	"invitation_id" text NOT NULL,
	"project_id" text NOT NULL,
	CONSTRAINT "invitation_project_pkey" PRIMARY KEY("invitation_id","project_id")
);--> statement-breakpoint
ALTER TABLE "user" ADD COLUMN "two_factor_enabled" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "invitation" ADD COLUMN "token_hash" text;--> statement-breakpoint
ALTER TABLE "invitation" ADD COLUMN "sent_at" timestamp with time zone DEFAULT now() NOT NULL;--> statement-breakpoint
ALTER TABLE "invitation" ADD COLUMN "accepted_by" text;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_team_id_id_key" UNIQUE("team_id","id");--> statement-breakpoint
ALTER TABLE "two_factor" ADD CONSTRAINT "two_factor_user_id_user_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "team_settings" ADD CONSTRAINT "team_settings_team_id_team_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."team"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation_project" ADD CONSTRAINT "invitation_project_invitation_fk" FOREIGN KEY ("team_id","invitation_id") REFERENCES "public"."invitation"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation_project" ADD CONSTRAINT "invitation_project_project_fk" FOREIGN KEY ("team_id","project_id") REFERENCES "public"."project"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "two_factor_secret_idx" ON "two_factor" USING btree ("secret");--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_accepted_by_user_id_fk" FOREIGN KEY ("accepted_by") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "invitation_pending_key" ON "invitation" USING btree ("team_id","email") WHERE "invitation"."status" = 'pending';--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_token_hash_unique" UNIQUE("token_hash");--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_pending_has_token" CHECK ("invitation"."status" <> 'pending' or "invitation"."token_hash" is not null);--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_accepted_by" CHECK (("invitation"."status" = 'accepted') = ("invitation"."accepted_by" is not null));