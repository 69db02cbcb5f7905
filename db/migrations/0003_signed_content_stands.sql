-- Once a change is submitted, what was signed for stands; until then its author may edit it. Its number, axis, version
-- and author never change, and no change is ever removed.
CREATE FUNCTION keep_signed_content() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF (NEW.org_id, NEW.id, NEW.number, NEW.axis_id, NEW.to_gain_set_id, NEW.author_id, NEW.author_name, NEW.created_at)
    IS DISTINCT FROM
    (OLD.org_id, OLD.id, OLD.number, OLD.axis_id, OLD.to_gain_set_id, OLD.author_id, OLD.author_name, OLD.created_at)
  THEN
    RAISE EXCEPTION 'Number, axis, version and author of a change are never changed.' USING ERRCODE = 'restrict_violation';
  END IF;
  IF OLD.state NOT IN ('draft', 'returned') AND
    (NEW.from_gain_set_id, NEW.reason, NEW.risk, NEW.test, NEW.way_back, NEW.temporary_until, NEW.safety_function,
      NEW.site_reference, NEW.content_hash)
    IS DISTINCT FROM
    (OLD.from_gain_set_id, OLD.reason, OLD.risk, OLD.test, OLD.way_back, OLD.temporary_until, OLD.safety_function,
      OLD.site_reference, OLD.content_hash)
  THEN
    RAISE EXCEPTION 'The content of a submitted change is never changed.' USING ERRCODE = 'restrict_violation';
  END IF;
  RETURN NEW;
END
$$;
--> statement-breakpoint
CREATE TRIGGER signed_content_stands BEFORE UPDATE ON changes FOR EACH ROW EXECUTE FUNCTION keep_signed_content();
--> statement-breakpoint
CREATE TRIGGER never_removed BEFORE DELETE ON changes FOR EACH ROW EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
CREATE TRIGGER never_emptied BEFORE TRUNCATE ON changes FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
-- In service on an axis can only be a version of that axis.
ALTER TABLE axes DROP CONSTRAINT axes_in_service;
--> statement-breakpoint
ALTER TABLE axes ADD CONSTRAINT axes_in_service
  FOREIGN KEY (org_id, id, in_service_gain_set_id) REFERENCES gain_sets (org_id, axis_id, id);
--> statement-breakpoint
-- Requests remove nothing but load cases and the keys of refused requests.
REVOKE DELETE ON
  memberships, api_tokens, machines, axes, changes, counters, outbox_messages, inbox_messages, persons FROM fettle_app;
--> statement-breakpoint
-- A token's hash is compared by the sign-in code alone.
REVOKE SELECT ON api_tokens FROM fettle_app;
--> statement-breakpoint
GRANT SELECT (org_id, id, person_id, name, role, created_at, expires_at, last_used_at, revoked_at) ON api_tokens TO fettle_app;
