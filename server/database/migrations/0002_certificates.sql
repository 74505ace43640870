CREATE TABLE "certificate_counters" (
	"organisation_id" uuid NOT NULL,
	"shop_id" uuid NOT NULL,
	"last_number" integer DEFAULT 0 NOT NULL,
	CONSTRAINT "certificate_counters_pkey" PRIMARY KEY("organisation_id","shop_id")
);
--> statement-breakpoint
CREATE TABLE "certificates" (
	"organisation_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"shop_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"reading_id" uuid NOT NULL,
	"reading_revision" integer NOT NULL,
	"code" text NOT NULL,
	"issued_at" timestamp (3) with time zone NOT NULL,
	"issued_by" text NOT NULL,
	"content" jsonb NOT NULL,
	"signature" "bytea" NOT NULL,
	"key_id" text NOT NULL,
	"withdrawn_at" timestamp (3) with time zone,
	"withdrawn_by" uuid,
	"withdrawal_reason" text,
	CONSTRAINT "certificates_pkey" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
ALTER TABLE "certificate_counters" ADD CONSTRAINT "certificate_counters_shop_fkey" FOREIGN KEY ("organisation_id","shop_id") REFERENCES "public"."shops"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "certificates" ADD CONSTRAINT "certificates_shop_fkey" FOREIGN KEY ("organisation_id","shop_id") REFERENCES "public"."shops"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "certificates_number_key" ON "certificates" USING btree ("organisation_id","shop_id","number");--> statement-breakpoint
CREATE UNIQUE INDEX "certificates_reading_key" ON "certificates" USING btree ("organisation_id","reading_id","reading_revision");--> statement-breakpoint
CREATE UNIQUE INDEX "certificates_code_key" ON "certificates" USING btree ("code");--> statement-breakpoint

-- Row-level security as for every table of an organisation.
DO $$
DECLARE table_name text;
BEGIN
  FOREACH table_name IN ARRAY ARRAY['certificates', 'certificate_counters'] LOOP
    EXECUTE format('ALTER TABLE %I ENABLE ROW LEVEL SECURITY', table_name);
    EXECUTE format('ALTER TABLE %I FORCE ROW LEVEL SECURITY', table_name);
    EXECUTE format('CREATE POLICY organisation_scope ON %I FOR ALL TO coldslip_app USING (organisation_id = current_organisation()) WITH CHECK (organisation_id = current_organisation())', table_name);
    EXECUTE format('GRANT SELECT, INSERT ON %I TO coldslip_app', table_name);
  END LOOP;
END $$;
--> statement-breakpoint

-- What was signed stays as it was; only a withdrawal is added.
GRANT UPDATE (withdrawn_at, withdrawn_by, withdrawal_reason) ON certificates TO coldslip_app;
--> statement-breakpoint
GRANT UPDATE ON certificate_counters TO coldslip_app;
--> statement-breakpoint

-- The public page: a code finds what anybody may see and nothing else. The role sees only the columns
-- that the answer is made of, so that a later edit of the function cannot show more by accident; `content`
-- is the exception, and of it only the members named here leave.
CREATE POLICY lookup ON certificates FOR SELECT TO coldslip_lookup USING (true);
--> statement-breakpoint
CREATE POLICY lookup ON readings FOR SELECT TO coldslip_lookup USING (true);
--> statement-breakpoint
GRANT SELECT (organisation_id, shop_id, number, reading_id, reading_revision, code, issued_at, content, withdrawn_at) ON certificates TO coldslip_lookup;
--> statement-breakpoint
GRANT SELECT (organisation_id, sampled_at, id, revision) ON readings TO coldslip_lookup;
--> statement-breakpoint
CREATE FUNCTION find_certificate(sought_code text)
  RETURNS TABLE (state text, number integer, shop_name text, time_zone text, demo boolean, issued_at timestamptz, withdrawn_at timestamptz,
                 sampled_at timestamptz, verdict text, declared text, digest text)
  LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public, pg_temp
  AS $$
    SELECT CASE WHEN c.withdrawn_at IS NOT NULL THEN 'withdrawn' WHEN r.revision > c.reading_revision THEN 'superseded' ELSE 'genuine' END,
           c.number, c.content->'shop'->>'name', c.content->'shop'->>'timeZone', (c.content->>'demo')::boolean, c.issued_at, c.withdrawn_at,
           r.sampled_at, c.content->'verdict'->>'kind', c.content->>'declared', c.content->'reading'->>'digest'
    FROM certificates c
    JOIN readings r ON r.organisation_id = c.organisation_id AND r.id = c.reading_id AND r.sampled_at = (c.content->'reading'->>'sampledAt')::timestamptz
    WHERE c.code = sought_code
  $$;
--> statement-breakpoint
GRANT CREATE ON SCHEMA public TO coldslip_lookup;
--> statement-breakpoint
ALTER FUNCTION find_certificate(text) OWNER TO coldslip_lookup;
--> statement-breakpoint
REVOKE CREATE ON SCHEMA public FROM coldslip_lookup;
--> statement-breakpoint
REVOKE ALL ON FUNCTION find_certificate(text) FROM PUBLIC;
--> statement-breakpoint
GRANT EXECUTE ON FUNCTION find_certificate(text) TO coldslip_app;
