-- What must never break, said where even psql can't get round it.

CREATE EXTENSION IF NOT EXISTS btree_gist;
--> statement-breakpoint
-- Two strategies approved for one plate on one machine: which would the operator read?
ALTER TABLE approvals ADD CONSTRAINT approvals_no_overlap EXCLUDE USING gist (
  plant_id WITH =, machine_id WITH =, grade_group WITH =, gas WITH =,
  int4range(thickness_min, thickness_max, '[)') WITH &&
) WHERE (ended_at IS NULL);
--> statement-breakpoint
CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog AS $$
BEGIN
  RAISE EXCEPTION 'a row of % is never changed or taken away', tg_table_name USING ERRCODE = 'CP001';
END $$;
--> statement-breakpoint
CREATE TRIGGER record_kept BEFORE UPDATE OR DELETE ON record FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER record_not_emptied BEFORE TRUNCATE ON record FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
CREATE TRIGGER record_heads_kept BEFORE DELETE ON record_heads FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER record_heads_not_emptied BEFORE TRUNCATE ON record_heads FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
CREATE TRIGGER reviews_kept BEFORE UPDATE OR DELETE ON reviews FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER reviews_not_emptied BEFORE TRUNCATE ON reviews FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
CREATE TRIGGER revision_authors_kept BEFORE UPDATE OR DELETE ON revision_authors FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER revision_authors_not_emptied BEFORE TRUNCATE ON revision_authors FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
CREATE TRIGGER machine_revisions_kept BEFORE UPDATE OR DELETE ON machine_revisions FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER nozzles_kept BEFORE UPDATE ON nozzles FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER grades_kept BEFORE UPDATE ON grades FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER files_kept BEFORE UPDATE ON files FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER approvals_not_taken_away BEFORE DELETE ON approvals FOR EACH ROW EXECUTE FUNCTION refuse_change();
CREATE TRIGGER approvals_not_emptied BEFORE TRUNCATE ON approvals FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
CREATE TRIGGER strategy_revisions_not_emptied BEFORE TRUNCATE ON strategy_revisions FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
-- A revision begins as a draft, moves one way, and keeps its content once handed in.
CREATE FUNCTION guard_revision() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog AS $$
BEGIN
  IF tg_op = 'INSERT' THEN
    IF new.state <> 'draft' THEN
      RAISE EXCEPTION 'a revision begins as a draft, not as %', new.state USING ERRCODE = 'CP002';
    END IF;
    RETURN new;
  END IF;
  IF tg_op = 'DELETE' THEN
    IF old.state <> 'draft' THEN
      RAISE EXCEPTION 'a revision that was handed in is kept' USING ERRCODE = 'CP001';
    END IF;
    RETURN old;
  END IF;
  IF (new.plant_id, new.id, new.strategy_id, new.number) IS DISTINCT FROM (old.plant_id, old.id, old.strategy_id, old.number) THEN
    RAISE EXCEPTION 'a revision stays itself' USING ERRCODE = 'CP001';
  END IF;
  IF (old.state <> 'draft' OR new.state <> old.state)
    AND (new.content, new.machine_id, new.machine_revision_id, new.grade_group, new.gas, new.nozzle_id, new.thickness_min,
         new.thickness_max, new.hottest_plate, new.prediction, new.model_version, new.core)
      IS DISTINCT FROM
        (old.content, old.machine_id, old.machine_revision_id, old.grade_group, old.gas, old.nozzle_id, old.thickness_min,
         old.thickness_max, old.hottest_plate, old.prediction, old.model_version, old.core) THEN
    RAISE EXCEPTION 'content never changes once handed in' USING ERRCODE = 'CP001';
  END IF;
  IF new.state <> old.state AND (old.state, new.state) NOT IN (
    ('draft', 'inReview'), ('inReview', 'approved'), ('inReview', 'returned'), ('approved', 'superseded'), ('approved', 'withdrawn')
  ) THEN
    RAISE EXCEPTION 'a revision does not go from % to %', old.state, new.state USING ERRCODE = 'CP002';
  END IF;
  RETURN new;
END $$;
--> statement-breakpoint
CREATE TRIGGER strategy_revisions_guard BEFORE INSERT OR UPDATE OR DELETE ON strategy_revisions
  FOR EACH ROW EXECUTE FUNCTION guard_revision();
--> statement-breakpoint
-- Whoever writes content becomes one of its authors, whether the caller thinks of it or not.
CREATE FUNCTION note_author() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  IF tg_op = 'INSERT' OR new.content IS DISTINCT FROM old.content THEN
    INSERT INTO public.revision_authors (plant_id, revision_id, user_id)
    VALUES (new.plant_id, new.id, new.changed_by)
    ON CONFLICT DO NOTHING;
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE TRIGGER strategy_revisions_authors AFTER INSERT OR UPDATE ON strategy_revisions
  FOR EACH ROW EXECUTE FUNCTION note_author();
--> statement-breakpoint
-- Approved is what is in review, by somebody who wrote none of it; after that an approval can only end, once.
CREATE FUNCTION guard_approval() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE
  now_state text;
BEGIN
  IF tg_op = 'INSERT' THEN
    SELECT state INTO now_state FROM public.strategy_revisions WHERE plant_id = new.plant_id AND id = new.revision_id;
    IF now_state IS DISTINCT FROM 'inReview' THEN
      RAISE EXCEPTION 'only a revision in review can be approved' USING ERRCODE = 'CP002';
    END IF;
    IF EXISTS (
      SELECT 1 FROM public.revision_authors
      WHERE plant_id = new.plant_id AND revision_id = new.revision_id AND user_id = new.approved_by
    ) THEN
      RAISE EXCEPTION 'nobody approves what they wrote' USING ERRCODE = 'CP003';
    END IF;
    IF new.ended_at IS NOT NULL THEN
      RAISE EXCEPTION 'an approval does not begin ended' USING ERRCODE = 'CP002';
    END IF;
    RETURN new;
  END IF;
  IF old.ended_at IS NOT NULL OR new.ended_at IS NULL
    OR (new.plant_id, new.id, new.revision_id, new.strategy_id, new.machine_id, new.grade_group, new.gas, new.thickness_min,
        new.thickness_max, new.approved_by, new.approved_at)
      IS DISTINCT FROM
       (old.plant_id, old.id, old.revision_id, old.strategy_id, old.machine_id, old.grade_group, old.gas, old.thickness_min,
        old.thickness_max, old.approved_by, old.approved_at) THEN
    RAISE EXCEPTION 'an approval can only end, once' USING ERRCODE = 'CP001';
  END IF;
  RETURN new;
END $$;
--> statement-breakpoint
CREATE TRIGGER approvals_guard BEFORE INSERT OR UPDATE ON approvals FOR EACH ROW EXECUTE FUNCTION guard_approval();
--> statement-breakpoint
-- At the end of every transaction a revision is approved if and only if an approval of it has not ended.
CREATE FUNCTION approved_means_approval() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE
  the_revision uuid := CASE tg_table_name WHEN 'approvals' THEN (to_jsonb(new) ->> 'revision_id')::uuid ELSE (to_jsonb(new) ->> 'id')::uuid END;
  live integer;
  now_state text;
BEGIN
  SELECT count(*) INTO live FROM public.approvals
    WHERE plant_id = new.plant_id AND revision_id = the_revision AND ended_at IS NULL;
  SELECT state INTO now_state FROM public.strategy_revisions WHERE plant_id = new.plant_id AND id = the_revision;
  IF now_state IS NOT NULL AND (now_state = 'approved') <> (live = 1) THEN
    RAISE EXCEPTION 'a revision is approved if and only if its approval has not ended' USING ERRCODE = 'CP002';
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER strategy_revisions_approved AFTER INSERT OR UPDATE OF state ON strategy_revisions
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION approved_means_approval();
CREATE CONSTRAINT TRIGGER approvals_approved AFTER INSERT OR UPDATE ON approvals
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION approved_means_approval();
--> statement-breakpoint
-- Numbers and chains the record. Runs as the owner, who alone may move a plant's head; the head's lock makes entries queue.
CREATE FUNCTION chain_record() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE
  head public.record_heads%ROWTYPE;
BEGIN
  INSERT INTO public.record_heads (plant_id, sequence, hash) VALUES (new.plant_id, 0, repeat('0', 64)) ON CONFLICT DO NOTHING;
  SELECT * INTO STRICT head FROM public.record_heads WHERE plant_id = new.plant_id FOR UPDATE;
  new.sequence := head.sequence + 1;
  -- Milliseconds, as JavaScript keeps them: the text and the column then say the same to whoever checks.
  new.at := date_trunc('milliseconds', clock_timestamp());
  new.previous_hash := head.hash;
  new.canonical := jsonb_build_object(
    'plantId', new.plant_id,
    'sequence', new.sequence,
    'at', to_char(new.at AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"'),
    'actorId', new.actor_id,
    'event', new.event,
    'subject', jsonb_build_object('kind', new.subject_kind, 'id', new.subject_id),
    'facts', new.facts
  )::text;
  new.hash := encode(sha256(convert_to(new.previous_hash || new.canonical, 'UTF8')), 'hex');
  UPDATE public.record_heads SET sequence = new.sequence, hash = new.hash WHERE plant_id = new.plant_id;
  RETURN new;
END $$;
--> statement-breakpoint
CREATE TRIGGER record_chained BEFORE INSERT ON record FOR EACH ROW EXECUTE FUNCTION chain_record();
