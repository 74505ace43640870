-- Roles, row-level security, look-ups before an organisation is known, partitions. None of it can be
-- declared in the ORM's schema (FORCE ROW LEVEL SECURITY, partitions, functions), so it is written by hand.

CREATE EXTENSION IF NOT EXISTS pg_trgm;
--> statement-breakpoint

-- Roles belong to the whole cluster: another database of it may have made them already, even just now.
DO $$
DECLARE role_name text;
BEGIN
  FOREACH role_name IN ARRAY ARRAY['coldslip_app', 'coldslip_lookup'] LOOP
    BEGIN
      EXECUTE format('CREATE ROLE %I NOLOGIN NOSUPERUSER NOCREATEDB NOCREATEROLE NOBYPASSRLS', role_name);
    EXCEPTION WHEN duplicate_object OR unique_violation THEN
      NULL;
    END;
    -- Two databases of one cluster may be migrated at once, and a grant rewrites the same catalogue row.
    BEGIN
      EXECUTE format('GRANT %I TO CURRENT_USER', role_name);
    EXCEPTION WHEN internal_error OR unique_violation THEN
      NULL;
    END;
  END LOOP;
END $$;
--> statement-breakpoint

GRANT USAGE ON SCHEMA public TO coldslip_app, coldslip_lookup;
--> statement-breakpoint

-- The organisation of the transaction. A setting made with set_config(…, true) reads back as an empty
-- string afterwards on the same connection, hence nullif.
CREATE FUNCTION current_organisation() RETURNS uuid
  LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT nullif(current_setting('coldslip.organisation_id', true), '')::uuid $$;
--> statement-breakpoint

DO $$
DECLARE table_name text;
BEGIN
  FOREACH table_name IN ARRAY ARRAY[
    'organisations', 'shops', 'people', 'memberships', 'sessions', 'instruments', 'device_tokens',
    'vehicles', 'work_orders', 'cylinders', 'lots', 'check_standards', 'limit_sets',
    'submissions', 'submission_chunks', 'refused_rows',
    'readings', 'reading_identities', 'reading_revisions', 'reading_rollups', 'audit_events', 'audit_heads'
  ] LOOP
    EXECUTE format('ALTER TABLE %I ENABLE ROW LEVEL SECURITY', table_name);
    EXECUTE format('ALTER TABLE %I FORCE ROW LEVEL SECURITY', table_name);
    EXECUTE format('CREATE POLICY organisation_scope ON %I FOR ALL TO coldslip_app USING (organisation_id = current_organisation()) WITH CHECK (organisation_id = current_organisation())', table_name);
    EXECUTE format('GRANT SELECT, INSERT ON %I TO coldslip_app', table_name);
  END LOOP;
END $$;
--> statement-breakpoint

-- What may change or go. The audit trail, limit sets, bytes, identities and superseded revisions may not.
GRANT UPDATE ON organisations, shops, people, sessions, instruments, device_tokens, vehicles, work_orders,
  cylinders, lots, check_standards, submissions, readings, reading_rollups, audit_heads TO coldslip_app;
--> statement-breakpoint
GRANT DELETE ON memberships, reading_rollups TO coldslip_app;
--> statement-breakpoint

-- Sign-in, a session cookie and a device token come before an organisation is known. Three narrow
-- functions answer them, owned by a role that can read those tables and do nothing else.
GRANT SELECT ON organisations, people, memberships, shops, sessions, device_tokens TO coldslip_lookup;
--> statement-breakpoint
CREATE POLICY lookup ON organisations FOR SELECT TO coldslip_lookup USING (true);
--> statement-breakpoint
CREATE POLICY lookup ON people FOR SELECT TO coldslip_lookup USING (true);
--> statement-breakpoint
CREATE POLICY lookup ON memberships FOR SELECT TO coldslip_lookup USING (true);
--> statement-breakpoint
CREATE POLICY lookup ON shops FOR SELECT TO coldslip_lookup USING (true);
--> statement-breakpoint
CREATE POLICY lookup ON sessions FOR SELECT TO coldslip_lookup USING (true);
--> statement-breakpoint
CREATE POLICY lookup ON device_tokens FOR SELECT TO coldslip_lookup USING (true);
--> statement-breakpoint

CREATE FUNCTION find_person(sought_email text)
  RETURNS TABLE (organisation_id uuid, person_id uuid, password_hash text, disabled boolean, demo boolean)
  LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public, pg_temp
  AS $$
    SELECT p.organisation_id, p.id, p.password_hash, p.disabled_at IS NOT NULL, o.demo
    FROM people p JOIN organisations o USING (organisation_id)
    WHERE p.email = lower(sought_email)
  $$;
--> statement-breakpoint
CREATE FUNCTION find_session(sought_digest bytea)
  RETURNS TABLE (organisation_id uuid, session_id uuid, person_id uuid, person_name text, email text,
                 organisation_name text, demo boolean, last_seen_at timestamptz, expires_at timestamptz, revoked boolean, disabled boolean, places jsonb)
  LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public, pg_temp
  AS $$
    SELECT s.organisation_id, s.id, s.person_id, p.name, p.email, o.name, o.demo, s.last_seen_at, s.expires_at,
           s.revoked_at IS NOT NULL, p.disabled_at IS NOT NULL,
           (SELECT coalesce(jsonb_agg(jsonb_build_object('shopId', h.id, 'name', h.name, 'timeZone', h.time_zone, 'role', m.role) ORDER BY h.name, m.role), '[]')
              FROM memberships m JOIN shops h ON h.organisation_id = m.organisation_id AND h.id = m.shop_id
              WHERE m.organisation_id = s.organisation_id AND m.person_id = s.person_id)
    FROM sessions s
    JOIN people p ON p.organisation_id = s.organisation_id AND p.id = s.person_id
    JOIN organisations o ON o.organisation_id = s.organisation_id
    WHERE s.digest = sought_digest
  $$;
--> statement-breakpoint
CREATE FUNCTION find_device_tokens(sought text[])
  RETURNS TABLE (lookup text, organisation_id uuid, token_id uuid, digest bytea, shop_id uuid, instrument_id uuid,
                 scopes text[], expires_at timestamptz, revoked boolean)
  LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public, pg_temp
  AS $$
    SELECT t.lookup, t.organisation_id, t.id, t.digest, t.shop_id, t.instrument_id, t.scopes, t.expires_at, t.revoked_at IS NOT NULL
    FROM device_tokens t WHERE t.lookup = ANY (sought)
  $$;
--> statement-breakpoint
GRANT CREATE ON SCHEMA public TO coldslip_lookup;
--> statement-breakpoint
ALTER FUNCTION find_person(text) OWNER TO coldslip_lookup;
--> statement-breakpoint
ALTER FUNCTION find_session(bytea) OWNER TO coldslip_lookup;
--> statement-breakpoint
ALTER FUNCTION find_device_tokens(text[]) OWNER TO coldslip_lookup;
--> statement-breakpoint
REVOKE CREATE ON SCHEMA public FROM coldslip_lookup;
--> statement-breakpoint
REVOKE ALL ON FUNCTION find_person(text), find_session(bytea), find_device_tokens(text[]) FROM PUBLIC;
--> statement-breakpoint
GRANT EXECUTE ON FUNCTION find_person(text), find_session(bytea), find_device_tokens(text[]) TO coldslip_app;
--> statement-breakpoint

-- Submissions whose worker went away, over all organisations: ids only.
CREATE POLICY lookup ON submissions FOR SELECT TO coldslip_lookup USING (true);
--> statement-breakpoint
GRANT SELECT ON submissions TO coldslip_lookup;
--> statement-breakpoint
CREATE FUNCTION find_abandoned_submissions(waiting_longer_than interval, at_most integer)
  RETURNS TABLE (organisation_id uuid, id uuid, attempt integer)
  LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public, pg_temp
  AS $$
    SELECT s.organisation_id, s.id, s.attempt FROM submissions s
    WHERE s.status IN ('received', 'processing')
      AND coalesce(s.lease_until, s.received_at + waiting_longer_than) < now()
    ORDER BY s.received_at LIMIT at_most
  $$;
--> statement-breakpoint
GRANT CREATE ON SCHEMA public TO coldslip_lookup;
--> statement-breakpoint
ALTER FUNCTION find_abandoned_submissions(interval, integer) OWNER TO coldslip_lookup;
--> statement-breakpoint
REVOKE CREATE ON SCHEMA public FROM coldslip_lookup;
--> statement-breakpoint
REVOKE ALL ON FUNCTION find_abandoned_submissions(interval, integer) FROM PUBLIC;
--> statement-breakpoint
GRANT EXECUTE ON FUNCTION find_abandoned_submissions(interval, integer) TO coldslip_app;
--> statement-breakpoint

-- Notes are searched by literal text; few readings bear one.
CREATE INDEX readings_note_idx ON readings USING gin (note gin_trgm_ops) WHERE note <> '';
--> statement-breakpoint

-- One partition a month, made ahead by a scheduled job and on demand for late or early readings. Runs as
-- the tables' owner because the application may not create tables. Made apart and then attached, so that
-- readers and writers of the other months are not held up.
CREATE FUNCTION ensure_reading_partition(any_day date) RETURNS void
  LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp
  AS $$
DECLARE
  first_day date := date_trunc('month', any_day)::date;
  next_day date := (date_trunc('month', any_day) + interval '1 month')::date;
  partition_name text := 'readings_' || to_char(any_day, 'YYYY_MM');
BEGIN
  IF any_day < date '1990-01-01' OR any_day >= date '2150-01-01' THEN
    RAISE EXCEPTION 'no partition for %', any_day USING ERRCODE = 'check_violation';
  END IF;
  IF to_regclass('public.' || partition_name) IS NOT NULL THEN RETURN; END IF;
  PERFORM pg_advisory_xact_lock(hashtext('coldslip readings partitions'));
  -- Asked of the catalogue itself: the name cache may still hold that there was none before the wait.
  IF EXISTS (SELECT FROM pg_class WHERE relnamespace = 'public'::regnamespace AND relname = partition_name) THEN RETURN; END IF;
  EXECUTE format('CREATE TABLE %I (LIKE readings INCLUDING ALL)', partition_name);
  EXECUTE format('ALTER TABLE %I ENABLE ROW LEVEL SECURITY', partition_name);
  EXECUTE format('ALTER TABLE %I FORCE ROW LEVEL SECURITY', partition_name);
  EXECUTE format('ALTER TABLE readings ATTACH PARTITION %I FOR VALUES FROM (%L) TO (%L)',
    partition_name, first_day || ' 00:00:00+00', next_day || ' 00:00:00+00');
END $$;
--> statement-breakpoint
REVOKE ALL ON FUNCTION ensure_reading_partition(date) FROM PUBLIC;
--> statement-breakpoint
GRANT EXECUTE ON FUNCTION ensure_reading_partition(date) TO coldslip_app;
--> statement-breakpoint

-- Last month to three months ahead, so that the first reading finds its place.
SELECT ensure_reading_partition((now() + make_interval(months => m))::date) FROM generate_series(-1, 3) AS m;
