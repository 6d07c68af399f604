-- Each entry carries the hash of the one before it and of itself. The time, the number and the hashes are set here, whatever the caller says.
CREATE FUNCTION audit_entry_hash(entry audit_entries, previous text) RETURNS text LANGUAGE sql STABLE SET search_path = pg_catalog, public AS $$
  SELECT encode(sha256(convert_to(previous || jsonb_build_array(
    entry.seq, to_char(entry.at AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US'), entry.actor_id, entry.session_ref, entry.action,
    entry.entity, entry.entity_id, entry.campaign_id, entry.before, entry.after, entry.reason)::text, 'UTF8')), 'hex')
$$;
--> statement-breakpoint
CREATE FUNCTION audit_entries_chain() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public AS $$
DECLARE
  head record;
BEGIN
  -- one writer at a time until its transaction ends: two entries can never follow the same one
  PERFORM pg_advisory_xact_lock(7291002);
  SELECT seq, hash INTO head FROM audit_entries ORDER BY seq DESC LIMIT 1;
  NEW.seq := coalesce(head.seq, 0) + 1;
  NEW.at := clock_timestamp();
  NEW.previous_hash := coalesce(head.hash, '');
  NEW.hash := audit_entry_hash(NEW, NEW.previous_hash);
  RETURN NEW;
END
$$;
--> statement-breakpoint
CREATE TRIGGER audit_entries_chain BEFORE INSERT ON audit_entries FOR EACH ROW EXECUTE FUNCTION audit_entries_chain();
--> statement-breakpoint
CREATE FUNCTION audit_entries_refuse() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'audit entries are never changed or removed' USING ERRCODE = '42501', TABLE = 'audit_entries';
END
$$;
--> statement-breakpoint
CREATE TRIGGER audit_entries_refuse BEFORE UPDATE OR DELETE OR TRUNCATE ON audit_entries FOR EACH STATEMENT EXECUTE FUNCTION audit_entries_refuse();
