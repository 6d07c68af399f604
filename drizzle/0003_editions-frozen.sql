CREATE TABLE "edition_runs" (
	"edition_id" text NOT NULL,
	"run_id" text NOT NULL,
	"reduction_key" text NOT NULL,
	CONSTRAINT "edition_runs_pkey" PRIMARY KEY("edition_id","run_id")
);
--> statement-breakpoint
ALTER TABLE "editions" ADD COLUMN "withdrawn_by" text;--> statement-breakpoint
ALTER TABLE "edition_runs" ADD CONSTRAINT "edition_runs_edition_id_fkey" FOREIGN KEY ("edition_id") REFERENCES "public"."editions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "edition_runs" ADD CONSTRAINT "edition_runs_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "edition_runs_run_id_index" ON "edition_runs" USING btree ("run_id");--> statement-breakpoint
ALTER TABLE "editions" ADD CONSTRAINT "editions_withdrawn_by_fkey" FOREIGN KEY ("withdrawn_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "editions" ADD CONSTRAINT "editions_withdrawal_check" CHECK (("editions"."withdrawn_at" is null) = ("editions"."withdrawn_by" is null) and ("editions"."withdrawn_at" is null) = ("editions"."withdrawn_reason" is null));--> statement-breakpoint
-- A run is frozen while an edition that holds it stands. Withdrawn, the edition keeps its own content and lets its runs go.
CREATE FUNCTION run_is_frozen(run text) RETURNS boolean LANGUAGE sql STABLE SET search_path = pg_catalog, public AS $$
  SELECT EXISTS (
    SELECT 1 FROM edition_runs er JOIN editions e ON e.id = er.edition_id WHERE er.run_id = run AND e.withdrawn_at IS NULL)
$$;
--> statement-breakpoint
CREATE FUNCTION refuse_frozen(run text) RETURNS void LANGUAGE plpgsql SET search_path = pg_catalog, public AS $$
BEGIN
  IF run_is_frozen(run) THEN
    RAISE EXCEPTION 'run % is held by a published edition', run
      USING ERRCODE = '23514', CONSTRAINT = 'runs_frozen_check', TABLE = 'runs';
  END IF;
END
$$;
--> statement-breakpoint
CREATE FUNCTION runs_refuse_frozen() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public AS $$
BEGIN
  PERFORM refuse_frozen(OLD.id);
  RETURN CASE WHEN TG_OP = 'DELETE' THEN OLD ELSE NEW END;
END
$$;
--> statement-breakpoint
CREATE TRIGGER runs_refuse_frozen BEFORE UPDATE OR DELETE ON runs FOR EACH ROW EXECUTE FUNCTION runs_refuse_frozen();
--> statement-breakpoint
CREATE FUNCTION run_parts_refuse_frozen() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public AS $$
BEGIN
  IF TG_OP <> 'INSERT' THEN PERFORM refuse_frozen(OLD.run_id); END IF;
  IF TG_OP <> 'DELETE' THEN PERFORM refuse_frozen(NEW.run_id); END IF;
  RETURN CASE WHEN TG_OP = 'DELETE' THEN OLD ELSE NEW END;
END
$$;
--> statement-breakpoint
CREATE TRIGGER feeds_refuse_frozen BEFORE INSERT OR UPDATE OR DELETE ON feeds FOR EACH ROW EXECUTE FUNCTION run_parts_refuse_frozen();
--> statement-breakpoint
CREATE TRIGGER hold_edits_refuse_frozen BEFORE INSERT OR UPDATE OR DELETE ON hold_edits FOR EACH ROW EXECUTE FUNCTION run_parts_refuse_frozen();
--> statement-breakpoint
CREATE TRIGGER exclusions_refuse_frozen BEFORE INSERT OR UPDATE OR DELETE ON exclusions FOR EACH ROW EXECUTE FUNCTION run_parts_refuse_frozen();
--> statement-breakpoint
CREATE TRIGGER decisions_refuse_frozen BEFORE INSERT OR UPDATE OR DELETE ON decisions FOR EACH ROW EXECUTE FUNCTION run_parts_refuse_frozen();
--> statement-breakpoint
CREATE TRIGGER uploads_refuse_frozen BEFORE INSERT OR UPDATE OR DELETE ON uploads FOR EACH ROW EXECUTE FUNCTION run_parts_refuse_frozen();
--> statement-breakpoint
CREATE FUNCTION reading_sets_refuse_frozen() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public AS $$
BEGIN
  -- a staged set that was never published counts for nothing and may be swept
  IF TG_OP <> 'INSERT' AND NOT (TG_OP = 'DELETE' AND OLD.superseded_at IS NOT NULL) THEN PERFORM refuse_frozen(OLD.run_id); END IF;
  RETURN CASE WHEN TG_OP = 'DELETE' THEN OLD ELSE NEW END;
END
$$;
--> statement-breakpoint
CREATE TRIGGER reading_sets_refuse_frozen BEFORE UPDATE OR DELETE ON reading_sets FOR EACH ROW EXECUTE FUNCTION reading_sets_refuse_frozen();
--> statement-breakpoint
CREATE FUNCTION loadings_refuse_frozen() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public AS $$
DECLARE
  run text;
BEGIN
  FOR run IN SELECT id FROM runs WHERE loading_id = OLD.id LOOP PERFORM refuse_frozen(run); END LOOP;
  RETURN CASE WHEN TG_OP = 'DELETE' THEN OLD ELSE NEW END;
END
$$;
--> statement-breakpoint
CREATE TRIGGER loadings_refuse_frozen BEFORE UPDATE OR DELETE ON loadings FOR EACH ROW EXECUTE FUNCTION loadings_refuse_frozen();
--> statement-breakpoint
-- An edition is never changed but for being withdrawn, once; what it holds is never changed at all.
CREATE FUNCTION editions_refuse() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public AS $$
BEGIN
  IF TG_OP = 'UPDATE' AND OLD.withdrawn_at IS NULL AND NEW.withdrawn_at IS NOT NULL
    AND (to_jsonb(NEW) - ARRAY['withdrawn_at', 'withdrawn_by', 'withdrawn_reason'])
      = (to_jsonb(OLD) - ARRAY['withdrawn_at', 'withdrawn_by', 'withdrawn_reason']) THEN
    RETURN NEW;
  END IF;
  RAISE EXCEPTION 'a published edition is never changed or removed'
    USING ERRCODE = '23514', CONSTRAINT = 'editions_frozen_check', TABLE = 'editions';
END
$$;
--> statement-breakpoint
CREATE TRIGGER editions_refuse BEFORE UPDATE OR DELETE ON editions FOR EACH ROW EXECUTE FUNCTION editions_refuse();
--> statement-breakpoint
CREATE FUNCTION editions_refuse_statement() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'what a published edition holds is never changed or removed'
    USING ERRCODE = '23514', CONSTRAINT = 'editions_frozen_check', TABLE = 'editions';
END
$$;
--> statement-breakpoint
CREATE TRIGGER editions_refuse_truncate BEFORE TRUNCATE ON editions FOR EACH STATEMENT EXECUTE FUNCTION editions_refuse_statement();
--> statement-breakpoint
CREATE TRIGGER edition_runs_refuse BEFORE UPDATE OR DELETE OR TRUNCATE ON edition_runs FOR EACH STATEMENT EXECUTE FUNCTION editions_refuse_statement();
