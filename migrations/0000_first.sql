CREATE TABLE "account" (
	"id" text PRIMARY KEY NOT NULL,
	"user_id" text NOT NULL,
	"provider_id" text NOT NULL,
	"account_id" text NOT NULL,
	"password" text,
	"access_token" text,
	"refresh_token" text,
	"id_token" text,
	"access_token_expires_at" timestamp with time zone,
	"refresh_token_expires_at" timestamp with time zone,
	"scope" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "rate_limit" (
	"id" text PRIMARY KEY NOT NULL,
	"key" text NOT NULL,
	"count" integer NOT NULL,
	"last_request" bigint NOT NULL,
	CONSTRAINT "rate_limit_key_unique" UNIQUE("key")
);
--> statement-breakpoint
CREATE TABLE "session" (
	"id" text PRIMARY KEY NOT NULL,
	"token" text NOT NULL,
	"user_id" text NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"ip_address" text,
	"user_agent" text,
	"active_team_id" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "session_token_unique" UNIQUE("token")
);
--> statement-breakpoint
CREATE TABLE "user" (
	"id" text PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"email" text NOT NULL,
	"email_verified" boolean DEFAULT false NOT NULL,
	"image" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "user_email_unique" UNIQUE("email")
);
--> statement-breakpoint
CREATE TABLE "verification" (
	"id" text PRIMARY KEY NOT NULL,
	"identifier" text NOT NULL,
	"value" text NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "book" (
	"id" text PRIMARY KEY NOT NULL,
	"team_id" text NOT NULL,
	"project_id" text NOT NULL,
	"number" integer DEFAULT 0 NOT NULL,
	"name" text NOT NULL,
	"description" text DEFAULT '' NOT NULL,
	"document_number" text DEFAULT '' NOT NULL,
	"basis" text NOT NULL,
	"flow_unit" text NOT NULL,
	"archived_at" timestamp with time zone,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"changed_by" text NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "book_basis_known" CHECK ("book"."basis" in ('mass', 'mole')),
	CONSTRAINT "book_named" CHECK (length(btrim("book"."name")) > 0),
	CONSTRAINT "book_number_counts" CHECK ("book"."number" >= 0)
);
--> statement-breakpoint
CREATE TABLE "book_change" (
	"book_id" text NOT NULL,
	"number" integer NOT NULL,
	"id" text NOT NULL,
	"schema_version" integer NOT NULL,
	"label" text NOT NULL,
	"body" jsonb NOT NULL,
	"body_hash" text NOT NULL,
	"by" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "book_change_pkey" PRIMARY KEY("book_id","number"),
	CONSTRAINT "book_change_book_id_id_key" UNIQUE("book_id","id"),
	CONSTRAINT "book_change_number_counts" CHECK ("book_change"."number" > 0)
);
--> statement-breakpoint
CREATE TABLE "book_summary" (
	"book_id" text PRIMARY KEY NOT NULL,
	"number" integer NOT NULL,
	"given" integer NOT NULL,
	"solvable" integer NOT NULL,
	"unknown" integer NOT NULL,
	"at_odds" integer NOT NULL,
	"degrees_of_freedom" integer NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "given" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"case_id" text NOT NULL,
	"stream_id" text NOT NULL,
	"quantity" text NOT NULL,
	"component_id" text,
	"instrument" text NOT NULL,
	"text" text NOT NULL,
	"value" double precision,
	"unit" text,
	"half_width" double precision,
	"sigma" double precision,
	"use" text NOT NULL,
	"source_kind" text,
	"source" text,
	"note" text,
	CONSTRAINT "given_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "given_quantity_known" CHECK ("given"."quantity" in ('flow', 'componentFlow', 'massFlow', 'moleFlow', 'componentMassFlow', 'componentMoleFlow', 'volumeFlow', 'massFraction', 'moleFraction')),
	CONSTRAINT "given_use_known" CHECK ("given"."use" in ('given', 'check', 'withdrawn')),
	CONSTRAINT "given_source_kind_known" CHECK ("given"."source_kind" in ('design', 'meter', 'laboratory', 'assumption', 'difference')),
	CONSTRAINT "given_in_place" CHECK ("given"."id" = concat_ws('/', "given"."case_id", "given"."stream_id", "given"."quantity", coalesce("given"."component_id", ''), "given"."instrument")),
	CONSTRAINT "given_half_width_above_zero" CHECK ("given"."half_width" > 0),
	CONSTRAINT "given_sigma_above_zero" CHECK ("given"."sigma" > 0),
	CONSTRAINT "given_component_named" CHECK (("given"."quantity" in ('flow', 'massFlow', 'moleFlow', 'volumeFlow')) = ("given"."component_id" is null))
);
--> statement-breakpoint
CREATE TABLE "operating_case" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"name" text NOT NULL,
	"position" double precision NOT NULL,
	CONSTRAINT "operating_case_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "operating_case_named" CHECK (length(btrim("operating_case"."name")) > 0)
);
--> statement-breakpoint
CREATE TABLE "mark" (
	"name" text PRIMARY KEY NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "coefficient" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"reaction_id" text NOT NULL,
	"component_id" text NOT NULL,
	"value" double precision NOT NULL,
	CONSTRAINT "coefficient_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "coefficient_in_place" CHECK ("coefficient"."id" = "coefficient"."reaction_id" || '/' || "coefficient"."component_id")
);
--> statement-breakpoint
CREATE TABLE "parameter" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"tag" text NOT NULL,
	"value" double precision,
	"note" text,
	"position" double precision NOT NULL,
	CONSTRAINT "parameter_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "parameter_book_id_tag_key" UNIQUE("book_id","tag")
);
--> statement-breakpoint
CREATE TABLE "reaction" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"tag" text NOT NULL,
	"name" text NOT NULL,
	"unit_id" text NOT NULL,
	"position" double precision NOT NULL,
	CONSTRAINT "reaction_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "reaction_book_id_tag_key" UNIQUE("book_id","tag")
);
--> statement-breakpoint
CREATE TABLE "rule" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"tag" text NOT NULL,
	"rule_kind" text NOT NULL,
	"use" text NOT NULL,
	"unit_id" text,
	"stream_id" text,
	"component_id" text,
	"other_stream_id" text,
	"other_component_id" text,
	"reaction_id" text,
	"value" double precision,
	"parameter_id" text,
	"text" text,
	"half_width" double precision,
	"note" text,
	"position" double precision NOT NULL,
	CONSTRAINT "rule_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "rule_book_id_tag_key" UNIQUE("book_id","tag"),
	CONSTRAINT "rule_rule_kind_known" CHECK ("rule"."rule_kind" in ('split', 'recovery', 'conversion', 'flowRatio', 'componentRatio', 'extent', 'yield', 'selectivity', 'excess', 'sameComposition', 'formula')),
	CONSTRAINT "rule_use_known" CHECK ("rule"."use" in ('given', 'check', 'withdrawn')),
	CONSTRAINT "rule_half_width_above_zero" CHECK ("rule"."half_width" > 0)
);
--> statement-breakpoint
CREATE TABLE "rule_stream" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"rule_id" text NOT NULL,
	"stream_id" text NOT NULL,
	CONSTRAINT "rule_stream_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "rule_stream_in_place" CHECK ("rule_stream"."id" = "rule_stream"."rule_id" || '/' || "rule_stream"."stream_id")
);
--> statement-breakpoint
CREATE TABLE "absence" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"stream_id" text NOT NULL,
	"component_id" text NOT NULL,
	CONSTRAINT "absence_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "absence_in_place" CHECK ("absence"."id" = "absence"."stream_id" || '/' || "absence"."component_id")
);
--> statement-breakpoint
CREATE TABLE "component" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"tag" text NOT NULL,
	"name" text NOT NULL,
	"formula" text,
	"molar_mass" double precision,
	"position" double precision NOT NULL,
	CONSTRAINT "component_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "component_book_id_tag_key" UNIQUE("book_id","tag"),
	CONSTRAINT "component_molar_mass_above_zero" CHECK ("component"."molar_mass" > 0)
);
--> statement-breakpoint
CREATE TABLE "inventory" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"unit_id" text NOT NULL,
	"component_id" text,
	"value" double precision NOT NULL,
	"unit" text,
	"note" text,
	CONSTRAINT "inventory_pkey" PRIMARY KEY("book_id","id")
);
--> statement-breakpoint
CREATE TABLE "link" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"stream_id" text NOT NULL,
	"direction" text NOT NULL,
	"unit_id" text NOT NULL,
	CONSTRAINT "link_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "link_direction_known" CHECK ("link"."direction" in ('in', 'out')),
	CONSTRAINT "link_in_place" CHECK ("link"."id" = "link"."stream_id" || '/' || "link"."direction")
);
--> statement-breakpoint
CREATE TABLE "stream" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"tag" text NOT NULL,
	"name" text NOT NULL,
	"phase" text,
	"density" double precision,
	"temperature" text,
	"pressure" text,
	"fractions" text NOT NULL,
	"difference_component_id" text,
	"note" text,
	"position" double precision NOT NULL,
	CONSTRAINT "stream_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "stream_book_id_tag_key" UNIQUE("book_id","tag"),
	CONSTRAINT "stream_density_above_zero" CHECK ("stream"."density" > 0),
	CONSTRAINT "stream_fractions_known" CHECK ("stream"."fractions" in ('asTyped', 'scale', 'difference')),
	CONSTRAINT "stream_difference_named" CHECK (("stream"."fractions" = 'difference') = ("stream"."difference_component_id" is not null))
);
--> statement-breakpoint
CREATE TABLE "unit" (
	"book_id" text NOT NULL,
	"id" text NOT NULL,
	"tag" text NOT NULL,
	"name" text NOT NULL,
	"unit_kind" text NOT NULL,
	"balance" text NOT NULL,
	"note" text,
	"position" double precision NOT NULL,
	CONSTRAINT "unit_pkey" PRIMARY KEY("book_id","id"),
	CONSTRAINT "unit_book_id_tag_key" UNIQUE("book_id","tag"),
	CONSTRAINT "unit_unit_kind_known" CHECK ("unit"."unit_kind" in ('mixer', 'splitter', 'separator', 'reactor')),
	CONSTRAINT "unit_balance_known" CHECK ("unit"."balance" in ('components', 'elements'))
);
--> statement-breakpoint
CREATE TABLE "invitation" (
	"id" text PRIMARY KEY NOT NULL,
	"team_id" text NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"status" text DEFAULT 'pending' NOT NULL,
	"inviter_id" text NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "invitation_role_known" CHECK ("invitation"."role" in ('owner', 'engineer', 'analyst', 'checker', 'reader')),
	CONSTRAINT "invitation_status_known" CHECK ("invitation"."status" in ('pending', 'accepted', 'rejected', 'canceled'))
);
--> statement-breakpoint
CREATE TABLE "member" (
	"id" text PRIMARY KEY NOT NULL,
	"team_id" text NOT NULL,
	"user_id" text NOT NULL,
	"role" text NOT NULL,
	"deactivated_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "member_team_id_user_id_key" UNIQUE("team_id","user_id"),
	CONSTRAINT "member_role_known" CHECK ("member"."role" in ('owner', 'engineer', 'analyst', 'checker', 'reader'))
);
--> statement-breakpoint
CREATE TABLE "project" (
	"id" text PRIMARY KEY NOT NULL,
	"team_id" text NOT NULL,
	"name" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "project_team_id_id_key" UNIQUE("team_id","id"),
	CONSTRAINT "project_team_id_name_key" UNIQUE("team_id","name"),
	CONSTRAINT "project_named" CHECK (length(btrim("project"."name")) > 0)
);
--> statement-breakpoint
CREATE TABLE "project_member" (
	"team_id" text NOT NULL,
	"project_id" text NOT NULL,
	"user_id" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "project_member_pkey" PRIMARY KEY("project_id","user_id")
);
--> statement-breakpoint
CREATE TABLE "team" (
	"id" text PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"slug" text NOT NULL,
	"logo" text,
	"metadata" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "team_slug_unique" UNIQUE("slug"),
	CONSTRAINT "team_slug_shape" CHECK ("team"."slug" ~ '^[a-z0-9]+(-[a-z0-9]+)*$' and length("team"."slug") <= 48)
);
--> statement-breakpoint
CREATE TABLE "team_event" (
	"id" text PRIMARY KEY NOT NULL,
	"team_id" text NOT NULL,
	"by" text NOT NULL,
	"action" text NOT NULL,
	"subject_kind" text NOT NULL,
	"subject_id" text NOT NULL,
	"detail" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "account" ADD CONSTRAINT "account_user_id_user_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session" ADD CONSTRAINT "session_user_id_user_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "book" ADD CONSTRAINT "book_team_id_team_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."team"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "book" ADD CONSTRAINT "book_created_by_user_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "book" ADD CONSTRAINT "book_changed_by_user_id_fk" FOREIGN KEY ("changed_by") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "book" ADD CONSTRAINT "book_project_fk" FOREIGN KEY ("team_id","project_id") REFERENCES "public"."project"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "book_change" ADD CONSTRAINT "book_change_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "book_change" ADD CONSTRAINT "book_change_by_user_id_fk" FOREIGN KEY ("by") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "book_summary" ADD CONSTRAINT "book_summary_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "given" ADD CONSTRAINT "given_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "given" ADD CONSTRAINT "given_case_id_fk" FOREIGN KEY ("book_id","case_id") REFERENCES "public"."operating_case"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "given" ADD CONSTRAINT "given_stream_id_fk" FOREIGN KEY ("book_id","stream_id") REFERENCES "public"."stream"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "given" ADD CONSTRAINT "given_component_id_fk" FOREIGN KEY ("book_id","component_id") REFERENCES "public"."component"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "operating_case" ADD CONSTRAINT "operating_case_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "coefficient" ADD CONSTRAINT "coefficient_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "coefficient" ADD CONSTRAINT "coefficient_reaction_id_fk" FOREIGN KEY ("book_id","reaction_id") REFERENCES "public"."reaction"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "coefficient" ADD CONSTRAINT "coefficient_component_id_fk" FOREIGN KEY ("book_id","component_id") REFERENCES "public"."component"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "parameter" ADD CONSTRAINT "parameter_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reaction" ADD CONSTRAINT "reaction_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reaction" ADD CONSTRAINT "reaction_unit_id_fk" FOREIGN KEY ("book_id","unit_id") REFERENCES "public"."unit"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule" ADD CONSTRAINT "rule_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule" ADD CONSTRAINT "rule_unit_id_fk" FOREIGN KEY ("book_id","unit_id") REFERENCES "public"."unit"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule" ADD CONSTRAINT "rule_stream_id_fk" FOREIGN KEY ("book_id","stream_id") REFERENCES "public"."stream"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule" ADD CONSTRAINT "rule_component_id_fk" FOREIGN KEY ("book_id","component_id") REFERENCES "public"."component"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule" ADD CONSTRAINT "rule_other_stream_id_fk" FOREIGN KEY ("book_id","other_stream_id") REFERENCES "public"."stream"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule" ADD CONSTRAINT "rule_other_component_id_fk" FOREIGN KEY ("book_id","other_component_id") REFERENCES "public"."component"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule" ADD CONSTRAINT "rule_reaction_id_fk" FOREIGN KEY ("book_id","reaction_id") REFERENCES "public"."reaction"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule" ADD CONSTRAINT "rule_parameter_id_fk" FOREIGN KEY ("book_id","parameter_id") REFERENCES "public"."parameter"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule_stream" ADD CONSTRAINT "rule_stream_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule_stream" ADD CONSTRAINT "rule_stream_rule_id_fk" FOREIGN KEY ("book_id","rule_id") REFERENCES "public"."rule"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rule_stream" ADD CONSTRAINT "rule_stream_stream_id_fk" FOREIGN KEY ("book_id","stream_id") REFERENCES "public"."stream"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "absence" ADD CONSTRAINT "absence_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "absence" ADD CONSTRAINT "absence_stream_id_fk" FOREIGN KEY ("book_id","stream_id") REFERENCES "public"."stream"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "absence" ADD CONSTRAINT "absence_component_id_fk" FOREIGN KEY ("book_id","component_id") REFERENCES "public"."component"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "component" ADD CONSTRAINT "component_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "inventory" ADD CONSTRAINT "inventory_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "inventory" ADD CONSTRAINT "inventory_unit_id_fk" FOREIGN KEY ("book_id","unit_id") REFERENCES "public"."unit"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "inventory" ADD CONSTRAINT "inventory_component_id_fk" FOREIGN KEY ("book_id","component_id") REFERENCES "public"."component"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "link" ADD CONSTRAINT "link_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "link" ADD CONSTRAINT "link_stream_id_fk" FOREIGN KEY ("book_id","stream_id") REFERENCES "public"."stream"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "link" ADD CONSTRAINT "link_unit_id_fk" FOREIGN KEY ("book_id","unit_id") REFERENCES "public"."unit"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stream" ADD CONSTRAINT "stream_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stream" ADD CONSTRAINT "stream_difference_component_id_fk" FOREIGN KEY ("book_id","difference_component_id") REFERENCES "public"."component"("book_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unit" ADD CONSTRAINT "unit_book_id_book_id_fk" FOREIGN KEY ("book_id") REFERENCES "public"."book"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_team_id_team_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."team"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_inviter_id_user_id_fk" FOREIGN KEY ("inviter_id") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "member" ADD CONSTRAINT "member_team_id_team_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."team"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "member" ADD CONSTRAINT "member_user_id_user_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "project" ADD CONSTRAINT "project_team_id_team_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."team"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "project" ADD CONSTRAINT "project_created_by_user_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "project_member" ADD CONSTRAINT "project_member_project_fk" FOREIGN KEY ("team_id","project_id") REFERENCES "public"."project"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "project_member" ADD CONSTRAINT "project_member_member_fk" FOREIGN KEY ("team_id","user_id") REFERENCES "public"."member"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "team_event" ADD CONSTRAINT "team_event_team_id_team_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."team"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "team_event" ADD CONSTRAINT "team_event_by_user_id_fk" FOREIGN KEY ("by") REFERENCES "public"."user"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "account_user_id_idx" ON "account" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "session_user_id_idx" ON "session" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "verification_identifier_idx" ON "verification" USING btree ("identifier");--> statement-breakpoint
CREATE INDEX "book_team_id_project_id_idx" ON "book" USING btree ("team_id","project_id");--> statement-breakpoint
CREATE INDEX "given_stream_id_idx" ON "given" USING btree ("book_id","stream_id");--> statement-breakpoint
CREATE INDEX "given_component_id_idx" ON "given" USING btree ("book_id","component_id");--> statement-breakpoint
CREATE INDEX "absence_stream_id_idx" ON "absence" USING btree ("book_id","stream_id");--> statement-breakpoint
CREATE INDEX "absence_component_id_idx" ON "absence" USING btree ("book_id","component_id");--> statement-breakpoint
CREATE INDEX "link_stream_id_idx" ON "link" USING btree ("book_id","stream_id");--> statement-breakpoint
CREATE INDEX "link_unit_id_idx" ON "link" USING btree ("book_id","unit_id");--> statement-breakpoint
CREATE INDEX "invitation_team_id_idx" ON "invitation" USING btree ("team_id");--> statement-breakpoint
CREATE INDEX "invitation_email_idx" ON "invitation" USING btree ("email");--> statement-breakpoint
CREATE INDEX "member_user_id_idx" ON "member" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "project_member_team_id_user_id_idx" ON "project_member" USING btree ("team_id","user_id");--> statement-breakpoint
CREATE INDEX "team_event_team_id_at_idx" ON "team_event" USING btree ("team_id","at");