-- The role that every request runs as. It owns nothing, so row-level security holds for it.
DO $$
BEGIN
  IF NOT EXISTS (SELECT FROM pg_roles WHERE rolname = 'fettle_app') THEN
    CREATE ROLE fettle_app NOLOGIN;
  END IF;
END
$$;
--> statement-breakpoint
DO $$
BEGIN
  -- On a shared server the role may be there already, and this user may be one of its members.
  IF NOT pg_has_role(CURRENT_USER, 'fettle_app', 'MEMBER') THEN
    GRANT fettle_app TO CURRENT_USER;
  END IF;
END
$$;
--> statement-breakpoint
GRANT USAGE ON SCHEMA public TO fettle_app;
--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA public TO fettle_app;
--> statement-breakpoint
-- Passwords, sessions and refused sign-ins are read before an organisation is known, by the sign-in code alone.
REVOKE ALL ON sessions, rate_limits FROM fettle_app;
--> statement-breakpoint
REVOKE UPDATE, DELETE ON gain_sets, change_events, field_reports, audit_events, organisations FROM fettle_app;
--> statement-breakpoint
REVOKE INSERT, UPDATE, DELETE ON persons FROM fettle_app;
--> statement-breakpoint
REVOKE SELECT ON persons FROM fettle_app;
--> statement-breakpoint
GRANT SELECT (id, email, name, created_at, deactivated_at) ON persons TO fettle_app;
--> statement-breakpoint
CREATE FUNCTION current_org() RETURNS uuid LANGUAGE sql STABLE
  AS $$ SELECT nullif(current_setting('app.org_id', true), '')::uuid $$;
--> statement-breakpoint
DO $$
DECLARE tenant text;
BEGIN
  FOREACH tenant IN ARRAY ARRAY[
    'memberships', 'api_tokens', 'machines', 'axes', 'load_cases', 'gain_sets', 'changes', 'change_events',
    'field_reports', 'audit_events', 'counters', 'idempotency_keys', 'outbox_messages', 'inbox_messages']
  LOOP
    EXECUTE format('ALTER TABLE %I ENABLE ROW LEVEL SECURITY', tenant);
    EXECUTE format(
      'CREATE POLICY own_organisation ON %I TO fettle_app USING (org_id = current_org()) WITH CHECK (org_id = current_org())',
      tenant);
  END LOOP;
END
$$;
--> statement-breakpoint
ALTER TABLE organisations ENABLE ROW LEVEL SECURITY;
--> statement-breakpoint
CREATE POLICY own_organisation ON organisations TO fettle_app USING (id = current_org());
--> statement-breakpoint
ALTER TABLE persons ENABLE ROW LEVEL SECURITY;
--> statement-breakpoint
CREATE POLICY own_organisation ON persons TO fettle_app USING (
  EXISTS (SELECT FROM memberships WHERE memberships.person_id = persons.id AND memberships.org_id = current_org()));
--> statement-breakpoint
-- What is kept stays as it was kept, for the app's role and for the owner of the tables alike.
CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'Rows of % are never changed or removed.', TG_TABLE_NAME USING ERRCODE = 'restrict_violation';
END
$$;
--> statement-breakpoint
DO $$
DECLARE kept text;
BEGIN
  FOREACH kept IN ARRAY ARRAY['gain_sets', 'change_events', 'field_reports', 'audit_events']
  LOOP
    EXECUTE format(
      'CREATE TRIGGER never_changed BEFORE UPDATE OR DELETE ON %I FOR EACH ROW EXECUTE FUNCTION refuse_change()', kept);
    EXECUTE format(
      'CREATE TRIGGER never_emptied BEFORE TRUNCATE ON %I FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()', kept);
  END LOOP;
END
$$;
--> statement-breakpoint
ALTER TABLE axes ADD CONSTRAINT axes_actuator_range CHECK (actuator_low IS NULL OR actuator_high IS NULL OR actuator_low < actuator_high);
--> statement-breakpoint
ALTER TABLE axes ADD CONSTRAINT axes_in_service
  FOREIGN KEY (org_id, in_service_gain_set_id) REFERENCES gain_sets (org_id, id);
--> statement-breakpoint
ALTER TABLE changes ADD CONSTRAINT changes_state CHECK (state IN (
  'draft', 'submitted', 'returned', 'approved', 'issued', 'applied', 'verified', 'rolled-back', 'withdrawn'));
