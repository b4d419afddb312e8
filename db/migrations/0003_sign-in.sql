-- The few things done before a plant is known. They run as the owner, each with one narrow question, a fixed search path, and nothing built
-- from text. Everybody's right to call them is taken away; migrate.ts gives it to the application's role.

CREATE FUNCTION sign_in_begin(
  p_account_key text, p_address_key text, p_by_account integer, p_by_address integer, p_window_seconds integer,
  OUT attempt bigint, OUT wait_seconds integer
) LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE
  since timestamptz := now() - make_interval(secs => p_window_seconds);
  nth_account timestamptz;
  nth_address timestamptz;
BEGIN
  -- Counting and adding are one step for an account and for an address, or many tries at once would all be under the limit.
  PERFORM pg_advisory_xact_lock(hashtextextended(least(p_account_key, p_address_key), 0));
  PERFORM pg_advisory_xact_lock(hashtextextended(greatest(p_account_key, p_address_key), 0));
  SELECT at INTO nth_account FROM public.sign_in_attempts WHERE account_key = p_account_key AND at > since
    ORDER BY at DESC OFFSET p_by_account - 1 LIMIT 1;
  SELECT at INTO nth_address FROM public.sign_in_attempts WHERE address_key = p_address_key AND at > since
    ORDER BY at DESC OFFSET p_by_address - 1 LIMIT 1;
  IF nth_account IS NOT NULL OR nth_address IS NOT NULL THEN
    wait_seconds := greatest(1, ceil(extract(epoch FROM
      greatest(nth_account, nth_address) + make_interval(secs => p_window_seconds) - now()))::integer);
    RETURN;
  END IF;
  -- Counted as failed until it is known to have succeeded.
  INSERT INTO public.sign_in_attempts (account_key, address_key) VALUES (p_account_key, p_address_key) RETURNING id INTO attempt;
END $$;
--> statement-breakpoint
CREATE FUNCTION sign_in_account(p_mail text, OUT user_id uuid, OUT password_hash text)
LANGUAGE sql STABLE SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT users.id, users.password_hash FROM public.users WHERE users.mail = p_mail
$$;
--> statement-breakpoint
-- The right password: the account's tries are forgotten, and a session opens in the plant last worked in, else the first by name.
CREATE FUNCTION sign_in_open(p_user_id uuid, p_account_key text, p_token_hash text, p_seconds integer) RETURNS boolean
LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE
  the_plant uuid;
BEGIN
  DELETE FROM public.sign_in_attempts WHERE account_key = p_account_key;
  SELECT memberships.plant_id INTO the_plant
    FROM public.memberships
    JOIN public.plants ON plants.id = memberships.plant_id
    LEFT JOIN LATERAL (
      SELECT max(sessions.seen_at) AS seen FROM public.sessions
      WHERE sessions.user_id = memberships.user_id AND sessions.plant_id = memberships.plant_id
    ) AS last ON true
    WHERE memberships.user_id = p_user_id AND memberships.ended_at IS NULL
    ORDER BY last.seen DESC NULLS LAST, plants.name, plants.id
    LIMIT 1;
  IF the_plant IS NULL THEN
    RETURN false;
  END IF;
  INSERT INTO public.sessions (token_hash, user_id, plant_id, expires_at)
    VALUES (p_token_hash, p_user_id, the_plant, now() + make_interval(secs => p_seconds));
  RETURN true;
END $$;
--> statement-breakpoint
-- Who is behind a session now. Membership, role and grant are read afresh each time, so a change holds from the next request on.
CREATE FUNCTION session_actor(
  p_token_hash text,
  OUT user_id uuid, OUT user_name text, OUT mail text, OUT plant_id uuid, OUT plant_name text, OUT role text, OUT may_approve boolean,
  OUT expires_at timestamptz
) LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
#variable_conflict use_column
DECLARE
  session public.sessions%ROWTYPE;
BEGIN
  SELECT * INTO session FROM public.sessions AS s
    WHERE s.token_hash = p_token_hash AND s.revoked_at IS NULL AND s.expires_at > now();
  IF NOT FOUND THEN
    RETURN;
  END IF;
  SELECT u.id, u.name, u.mail, p.id, p.name, m.role, m.may_approve, session.expires_at
    INTO user_id, user_name, mail, plant_id, plant_name, role, may_approve, expires_at
    FROM public.memberships AS m
    JOIN public.users AS u ON u.id = m.user_id
    JOIN public.plants AS p ON p.id = m.plant_id
    WHERE m.plant_id = session.plant_id AND m.user_id = session.user_id AND m.ended_at IS NULL;
  -- A row written by every request would make reading as dear as writing: a minute is fine enough.
  IF FOUND AND session.seen_at < now() - interval '1 minute' THEN
    UPDATE public.sessions SET seen_at = now() WHERE id = session.id;
  END IF;
END $$;
--> statement-breakpoint
CREATE FUNCTION session_memberships(p_token_hash text)
RETURNS TABLE (plant_id uuid, plant_name text, role text)
LANGUAGE sql STABLE SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT plants.id, plants.name, memberships.role
  FROM public.sessions
  JOIN public.memberships ON memberships.user_id = sessions.user_id AND memberships.ended_at IS NULL
  JOIN public.plants ON plants.id = memberships.plant_id
  WHERE sessions.token_hash = p_token_hash AND sessions.revoked_at IS NULL AND sessions.expires_at > now()
  ORDER BY plants.name, plants.id
$$;
--> statement-breakpoint
CREATE FUNCTION session_end(p_token_hash text) RETURNS void
LANGUAGE sql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
  UPDATE public.sessions SET revoked_at = now() WHERE token_hash = p_token_hash AND revoked_at IS NULL
$$;
--> statement-breakpoint
-- Another plant is another session: the old id is worth nothing afterwards. The day's end stays where it was.
CREATE FUNCTION session_move(p_token_hash text, p_plant_id uuid, p_new_token_hash text) RETURNS boolean
LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
DECLARE
  session public.sessions%ROWTYPE;
BEGIN
  SELECT * INTO session FROM public.sessions
    WHERE token_hash = p_token_hash AND revoked_at IS NULL AND expires_at > now() FOR UPDATE;
  IF NOT FOUND OR NOT EXISTS (
    SELECT 1 FROM public.memberships
    WHERE memberships.plant_id = p_plant_id AND memberships.user_id = session.user_id AND memberships.ended_at IS NULL
  ) THEN
    RETURN false;
  END IF;
  UPDATE public.sessions SET revoked_at = now() WHERE id = session.id;
  INSERT INTO public.sessions (token_hash, user_id, plant_id, expires_at)
    VALUES (p_new_token_hash, session.user_id, p_plant_id, session.expires_at);
  RETURN true;
END $$;
--> statement-breakpoint
-- The account of a mail address: the one that exists, with its own name and password, or a new one.
CREATE FUNCTION account_for(p_id uuid, p_mail text, p_name text, p_password_hash text, OUT user_id uuid, OUT is_new boolean)
LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
BEGIN
  INSERT INTO public.users (id, mail, name, password_hash) VALUES (p_id, p_mail, p_name, p_password_hash)
    ON CONFLICT ON CONSTRAINT users_mail_once DO NOTHING
    RETURNING users.id INTO user_id;
  is_new := user_id IS NOT NULL;
  IF NOT is_new THEN
    SELECT users.id INTO STRICT user_id FROM public.users WHERE users.mail = p_mail;
  END IF;
END $$;
--> statement-breakpoint
-- Of these keys in the bucket, those no row knows.
CREATE FUNCTION stray_file_keys(p_keys text[]) RETURNS SETOF text
LANGUAGE sql STABLE SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
  SELECT given FROM unnest(p_keys) AS given WHERE NOT EXISTS (SELECT 1 FROM public.files WHERE files.key = given)
$$;
--> statement-breakpoint
-- What has had its time: answers kept for repeated requests, tries to sign in, sessions a month past their end.
CREATE FUNCTION sweep_expired(p_answer_seconds integer, p_window_seconds integer) RETURNS void
LANGUAGE sql SECURITY DEFINER SET search_path = pg_catalog, public, pg_temp AS $$
  DELETE FROM public.idempotency_keys WHERE at < now() - make_interval(secs => p_answer_seconds);
  DELETE FROM public.sign_in_attempts WHERE at < now() - make_interval(secs => p_window_seconds);
  DELETE FROM public.sessions WHERE expires_at < now() - interval '30 days';
$$;
--> statement-breakpoint
REVOKE EXECUTE ON FUNCTION
  sign_in_begin(text, text, integer, integer, integer), sign_in_account(text), sign_in_open(uuid, text, text, integer), session_actor(text),
  session_memberships(text), session_end(text), session_move(text, uuid, text), account_for(uuid, text, text, text),
  stray_file_keys(text[]), sweep_expired(integer, integer)
FROM PUBLIC;
