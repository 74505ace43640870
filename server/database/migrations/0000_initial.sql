CREATE TABLE "memberships" (
	"organisation_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"shop_id" uuid NOT NULL,
	"role" text NOT NULL,
	CONSTRAINT "memberships_pkey" PRIMARY KEY("organisation_id","person_id","shop_id","role")
);
--> statement-breakpoint
CREATE TABLE "organisations" (
	"organisation_id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"demo" boolean DEFAULT false NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "people" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"certification" text,
	"disabled_at" timestamp (3) with time zone,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "people_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"digest" "bytea" NOT NULL,
	"user_agent" text DEFAULT '' NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"revoked_at" timestamp (3) with time zone,
	CONSTRAINT "sessions_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "shops" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"time_zone" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "shops_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "device_tokens" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"shop_id" uuid NOT NULL,
	"instrument_id" uuid NOT NULL,
	"lookup" text NOT NULL,
	"digest" "bytea" NOT NULL,
	"scopes" text[] NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp (3) with time zone,
	"revoked_at" timestamp (3) with time zone,
	"last_used_at" timestamp (3) with time zone,
	CONSTRAINT "device_tokens_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "instruments" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"shop_id" uuid NOT NULL,
	"serial" text NOT NULL,
	"model" text DEFAULT '' NOT NULL,
	"uncertainty" jsonb NOT NULL,
	"provisional" boolean DEFAULT false NOT NULL,
	"calibration_due_at" timestamp (3) with time zone,
	"filter_changed_at" timestamp (3) with time zone,
	"filter_life_samples" integer,
	"ambient_minimum_celsius" double precision DEFAULT 10 NOT NULL,
	"ambient_maximum_celsius" double precision DEFAULT 49 NOT NULL,
	"out_of_control_since" timestamp (3) with time zone,
	"warm_up_seconds" integer DEFAULT 60 NOT NULL,
	"zero_seconds" integer DEFAULT 20 NOT NULL,
	"sample_seconds" integer DEFAULT 60 NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "instruments_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "check_standards" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"assigned" jsonb,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "check_standards_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "cylinders" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"tag" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "cylinders_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "lots" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"number" text NOT NULL,
	"supplier" text,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "lots_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "vehicles" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"vin" text,
	"plate" text,
	"plate_key" text,
	"make" text,
	"model" text,
	"model_year" integer,
	"declared" text,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "vehicles_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "work_orders" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"shop_id" uuid NOT NULL,
	"number" text NOT NULL,
	"vehicle_id" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "work_orders_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "limit_sets" (
	"organisation_id" uuid NOT NULL,
	"version" integer NOT NULL,
	"content" jsonb NOT NULL,
	"effective_from" timestamp (3) with time zone NOT NULL,
	"created_by" uuid,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "limit_sets_pkey" PRIMARY KEY("organisation_id","version")
);
--> statement-breakpoint
CREATE TABLE "refused_rows" (
	"organisation_id" uuid NOT NULL,
	"submission_id" uuid NOT NULL,
	"ordinal" integer NOT NULL,
	"reason_ordinal" integer NOT NULL,
	"line" integer,
	"column" text,
	"pointer" text,
	"value" text,
	"code" text NOT NULL,
	"reason" text NOT NULL,
	"mend" text NOT NULL,
	"sender_reading_id" text,
	"conflicting_reading_id" uuid,
	CONSTRAINT "refused_rows_pkey" PRIMARY KEY("organisation_id","submission_id","ordinal","reason_ordinal")
);
--> statement-breakpoint
CREATE TABLE "submission_chunks" (
	"organisation_id" uuid NOT NULL,
	"submission_id" uuid NOT NULL,
	"ordinal" integer NOT NULL,
	"bytes" "bytea" NOT NULL,
	CONSTRAINT "submission_chunks_pkey" PRIMARY KEY("organisation_id","submission_id","ordinal")
);
--> statement-breakpoint
CREATE TABLE "submissions" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"shop_id" uuid NOT NULL,
	"source" text NOT NULL,
	"sender" text NOT NULL,
	"instrument_id" uuid,
	"person_id" uuid,
	"media_type" text NOT NULL,
	"content_encoding" text,
	"byte_length" bigint NOT NULL,
	"sha256" "bytea" NOT NULL,
	"idempotency_key" text,
	"status" text DEFAULT 'received' NOT NULL,
	"received_at" timestamp (3) with time zone NOT NULL,
	"processed_at" timestamp (3) with time zone,
	"attempt" integer DEFAULT 0 NOT NULL,
	"lease_until" timestamp (3) with time zone,
	"next_ordinal" integer DEFAULT 1 NOT NULL,
	"received_count" integer DEFAULT 0 NOT NULL,
	"accepted_count" integer DEFAULT 0 NOT NULL,
	"repeated_count" integer DEFAULT 0 NOT NULL,
	"refused_count" integer DEFAULT 0 NOT NULL,
	"failure" jsonb,
	"report" jsonb,
	"first_answer" jsonb,
	CONSTRAINT "submissions_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "reading_identities" (
	"organisation_id" uuid NOT NULL,
	"sender" text NOT NULL,
	"sender_reading_id" text NOT NULL,
	"reading_id" uuid NOT NULL,
	"sampled_at" timestamp (3) with time zone NOT NULL,
	"submission_id" uuid NOT NULL,
	"content_digest" "bytea" NOT NULL,
	CONSTRAINT "reading_identities_pkey" PRIMARY KEY("organisation_id","sender","sender_reading_id")
);
--> statement-breakpoint
CREATE TABLE "reading_revisions" (
	"organisation_id" uuid NOT NULL,
	"reading_id" uuid NOT NULL,
	"revision" integer NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	"person_id" uuid,
	"reason" text,
	"verdict" text NOT NULL,
	"limit_set_version" integer NOT NULL,
	"snapshot" jsonb NOT NULL,
	CONSTRAINT "reading_revisions_pkey" PRIMARY KEY("organisation_id","reading_id","revision")
);
--> statement-breakpoint
CREATE TABLE "reading_rollups" (
	"organisation_id" uuid NOT NULL,
	"shop_id" uuid NOT NULL,
	"day" text NOT NULL,
	"declared" text NOT NULL,
	"subject_kind" text NOT NULL,
	"instrument_id" uuid NOT NULL,
	"verdict" text NOT NULL,
	"n" integer NOT NULL,
	"purity_sum" double precision NOT NULL,
	"purity_square_sum" double precision NOT NULL,
	"air_n" integer NOT NULL,
	"air_sum" double precision NOT NULL,
	"air_square_sum" double precision NOT NULL,
	CONSTRAINT "reading_rollups_pkey" PRIMARY KEY("organisation_id","shop_id","day","declared","subject_kind","instrument_id","verdict")
);
--> statement-breakpoint
CREATE TABLE "readings" (
	"organisation_id" uuid NOT NULL,
	"sampled_at" timestamp (3) with time zone NOT NULL,
	"id" uuid NOT NULL,
	"shop_id" uuid NOT NULL,
	"instrument_id" uuid,
	"sequence" bigint,
	"subject_kind" text NOT NULL,
	"subject_id" uuid NOT NULL,
	"work_order_id" uuid,
	"declared" text NOT NULL,
	"verdict" text NOT NULL,
	"decided_by" text NOT NULL,
	"decided_by_substance" text,
	"purity_percent" double precision NOT NULL,
	"purity_uncertainty" double precision,
	"air_percent" double precision,
	"contaminants" jsonb NOT NULL,
	"resolution" double precision NOT NULL,
	"reported" jsonb NOT NULL,
	"composition" jsonb NOT NULL,
	"verdict_detail" jsonb NOT NULL,
	"limit_set_version" integer NOT NULL,
	"attempt" integer NOT NULL,
	"flags" text[] NOT NULL,
	"batch" text,
	"operator" text,
	"note" text DEFAULT '' NOT NULL,
	"ambient_celsius" double precision,
	"pressure_kilopascal" double precision,
	"pressure_kind" text,
	"port" text,
	"extras" jsonb,
	"source" text NOT NULL,
	"submission_id" uuid NOT NULL,
	"ordinal" integer NOT NULL,
	"line" integer,
	"sender" text NOT NULL,
	"sender_reading_id" text NOT NULL,
	"received_at" timestamp (3) with time zone NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"revised_at" timestamp (3) with time zone,
	"revised_by" uuid,
	"revision_reason" text,
	"record_digest" "bytea" NOT NULL,
	"audit_sequence" bigint NOT NULL,
	CONSTRAINT "readings_pkey" PRIMARY KEY("organisation_id","sampled_at","id")
) PARTITION BY RANGE ("sampled_at");
--> statement-breakpoint
CREATE TABLE "audit_events" (
	"organisation_id" uuid NOT NULL,
	"sequence" bigint NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	"actor" text NOT NULL,
	"action" text NOT NULL,
	"entity_kind" text NOT NULL,
	"entity_id" text NOT NULL,
	"detail" jsonb NOT NULL,
	"previous_digest" "bytea" NOT NULL,
	"digest" "bytea" NOT NULL,
	CONSTRAINT "audit_events_pkey" PRIMARY KEY("organisation_id","sequence")
);
--> statement-breakpoint
CREATE TABLE "audit_heads" (
	"organisation_id" uuid PRIMARY KEY NOT NULL,
	"sequence" bigint NOT NULL,
	"digest" "bytea" NOT NULL
);
--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_person_fkey" FOREIGN KEY ("organisation_id","person_id") REFERENCES "public"."people"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_shop_fkey" FOREIGN KEY ("organisation_id","shop_id") REFERENCES "public"."shops"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_person_fkey" FOREIGN KEY ("organisation_id","person_id") REFERENCES "public"."people"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "device_tokens" ADD CONSTRAINT "device_tokens_instrument_fkey" FOREIGN KEY ("organisation_id","instrument_id") REFERENCES "public"."instruments"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "device_tokens" ADD CONSTRAINT "device_tokens_shop_fkey" FOREIGN KEY ("organisation_id","shop_id") REFERENCES "public"."shops"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instruments" ADD CONSTRAINT "instruments_shop_fkey" FOREIGN KEY ("organisation_id","shop_id") REFERENCES "public"."shops"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "work_orders" ADD CONSTRAINT "work_orders_vehicle_fkey" FOREIGN KEY ("organisation_id","vehicle_id") REFERENCES "public"."vehicles"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "refused_rows" ADD CONSTRAINT "refused_rows_submission_fkey" FOREIGN KEY ("organisation_id","submission_id") REFERENCES "public"."submissions"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "submission_chunks" ADD CONSTRAINT "submission_chunks_submission_fkey" FOREIGN KEY ("organisation_id","submission_id") REFERENCES "public"."submissions"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "submissions" ADD CONSTRAINT "submissions_shop_fkey" FOREIGN KEY ("organisation_id","shop_id") REFERENCES "public"."shops"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "people_email_key" ON "people" USING btree ("email");--> statement-breakpoint
CREATE UNIQUE INDEX "sessions_digest_key" ON "sessions" USING btree ("digest");--> statement-breakpoint
CREATE INDEX "sessions_person_idx" ON "sessions" USING btree ("organisation_id","person_id","created_at");--> statement-breakpoint
CREATE UNIQUE INDEX "device_tokens_lookup_key" ON "device_tokens" USING btree ("lookup");--> statement-breakpoint
CREATE UNIQUE INDEX "instruments_serial_key" ON "instruments" USING btree ("organisation_id","serial");--> statement-breakpoint
CREATE UNIQUE INDEX "check_standards_name_key" ON "check_standards" USING btree ("organisation_id","name");--> statement-breakpoint
CREATE UNIQUE INDEX "cylinders_tag_key" ON "cylinders" USING btree ("organisation_id","tag");--> statement-breakpoint
CREATE UNIQUE INDEX "lots_number_key" ON "lots" USING btree ("organisation_id","number");--> statement-breakpoint
CREATE UNIQUE INDEX "vehicles_vin_key" ON "vehicles" USING btree ("organisation_id","vin") WHERE vin is not null;--> statement-breakpoint
CREATE UNIQUE INDEX "vehicles_plate_key" ON "vehicles" USING btree ("organisation_id","plate_key") WHERE vin is null and plate_key is not null;--> statement-breakpoint
CREATE INDEX "vehicles_plate_idx" ON "vehicles" USING btree ("organisation_id","plate_key");--> statement-breakpoint
CREATE UNIQUE INDEX "work_orders_number_key" ON "work_orders" USING btree ("organisation_id","shop_id","number");--> statement-breakpoint
CREATE INDEX "work_orders_vehicle_idx" ON "work_orders" USING btree ("organisation_id","vehicle_id");--> statement-breakpoint
CREATE UNIQUE INDEX "submissions_idempotency_key" ON "submissions" USING btree ("organisation_id","sender","idempotency_key") WHERE idempotency_key is not null;--> statement-breakpoint
CREATE INDEX "submissions_received_idx" ON "submissions" USING btree ("organisation_id","received_at","id");--> statement-breakpoint
CREATE INDEX "submissions_open_idx" ON "submissions" USING btree ("lease_until","received_at") WHERE status in ('received', 'processing');--> statement-breakpoint
CREATE INDEX "reading_identities_submission_idx" ON "reading_identities" USING btree ("organisation_id","submission_id");--> statement-breakpoint
CREATE INDEX "readings_subject_idx" ON "readings" USING btree ("organisation_id","subject_id","sampled_at","id");--> statement-breakpoint
CREATE INDEX "readings_shop_idx" ON "readings" USING btree ("organisation_id","shop_id","sampled_at","id");--> statement-breakpoint
CREATE INDEX "readings_instrument_idx" ON "readings" USING btree ("organisation_id","instrument_id","sampled_at","id");--> statement-breakpoint
CREATE INDEX "readings_declared_idx" ON "readings" USING btree ("organisation_id","declared","sampled_at","id");--> statement-breakpoint
CREATE INDEX "readings_verdict_idx" ON "readings" USING btree ("organisation_id","verdict","shop_id","sampled_at","id") WHERE verdict <> 'connect';--> statement-breakpoint
CREATE INDEX "readings_batch_idx" ON "readings" USING btree ("organisation_id","batch","sampled_at","id") WHERE batch is not null;