-- A plant sees its own rows only. The plant is set per transaction; without one there is nothing to see.
-- FORCE, so that the owner of the tables is held to it too: only the policies "for the owner" below let its functions look across.
DO $$
DECLARE
  name text;
BEGIN
  FOREACH name IN ARRAY ARRAY[
    'approvals', 'corner_plans', 'files', 'grades', 'idempotency_keys', 'machine_revisions', 'machines', 'memberships', 'nozzles', 'parts',
    'plates', 'record', 'record_heads', 'reports', 'requests', 'reviews', 'revision_authors', 'sessions', 'strategies', 'strategy_revisions'
  ] LOOP
    EXECUTE format('ALTER TABLE %I ENABLE ROW LEVEL SECURITY', name);
    EXECUTE format('ALTER TABLE %I FORCE ROW LEVEL SECURITY', name);
    EXECUTE format(
      'CREATE POLICY own_plant ON %I USING (plant_id = (SELECT nullif(current_setting(''app.plant_id'', true), '''')::uuid))
         WITH CHECK (plant_id = (SELECT nullif(current_setting(''app.plant_id'', true), '''')::uuid))',
      name
    );
  END LOOP;
END $$;
--> statement-breakpoint
ALTER TABLE plants ENABLE ROW LEVEL SECURITY;
ALTER TABLE plants FORCE ROW LEVEL SECURITY;
CREATE POLICY own_plant ON plants FOR SELECT
  USING (id = (SELECT nullif(current_setting('app.plant_id', true), '')::uuid));
CREATE POLICY for_the_owner ON plants TO CURRENT_USER USING (true) WITH CHECK (true);
--> statement-breakpoint
-- People are seen by the plants they are or were a member of.
ALTER TABLE users ENABLE ROW LEVEL SECURITY;
ALTER TABLE users FORCE ROW LEVEL SECURITY;
CREATE POLICY members ON users FOR SELECT USING (
  EXISTS (
    SELECT 1 FROM memberships
    WHERE memberships.user_id = users.id
      AND memberships.plant_id = (SELECT nullif(current_setting('app.plant_id', true), '')::uuid)
  )
);
CREATE POLICY for_the_owner ON users TO CURRENT_USER USING (true) WITH CHECK (true);
--> statement-breakpoint
-- No plant's table, and nobody's business: the sign-in functions alone use it.
ALTER TABLE sign_in_attempts ENABLE ROW LEVEL SECURITY;
ALTER TABLE sign_in_attempts FORCE ROW LEVEL SECURITY;
CREATE POLICY for_the_owner ON sign_in_attempts TO CURRENT_USER USING (true) WITH CHECK (true);
--> statement-breakpoint
-- What the functions of the next migration look at before any plant is known, and what the sweep takes away.
CREATE POLICY for_the_owner ON sessions TO CURRENT_USER USING (true) WITH CHECK (true);
CREATE POLICY for_the_owner ON memberships FOR SELECT TO CURRENT_USER USING (true);
CREATE POLICY for_the_owner ON files FOR SELECT TO CURRENT_USER USING (true);
CREATE POLICY for_the_owner_to_read ON idempotency_keys FOR SELECT TO CURRENT_USER USING (true);
CREATE POLICY for_the_owner_to_sweep ON idempotency_keys FOR DELETE TO CURRENT_USER USING (true);
