-- Rules that a table definition cannot carry: append-only tables, storage, first rows, and the quota's ledger.

CREATE SCHEMA queue;

CREATE FUNCTION queue.refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION '% is append-only', tg_table_name USING errcode = 'restrict_violation';
END $$;
CREATE TRIGGER audit_entries_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON audit_entries
  FOR EACH STATEMENT EXECUTE FUNCTION queue.refuse_change();
CREATE TRIGGER quota_entries_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON quota_entries
  FOR EACH STATEMENT EXECUTE FUNCTION queue.refuse_change();
CREATE TRIGGER settings_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON settings
  FOR EACH STATEMENT EXECUTE FUNCTION queue.refuse_change();

-- uncompressed and out of line: a piece of a row is read without the rest
ALTER TABLE result_array_rows ALTER COLUMN data SET STORAGE EXTERNAL;
ALTER TABLE part_rows ALTER COLUMN data SET STORAGE EXTERNAL;
ALTER TABLE kernels ALTER COLUMN bytes SET STORAGE EXTERNAL;
ALTER TABLE tables ALTER COLUMN bytes SET STORAGE EXTERNAL;
-- rows that are rewritten all the time stay on their page
ALTER TABLE leases SET (fillfactor = 50);
ALTER TABLE turns SET (fillfactor = 50);
ALTER TABLE quota_balances SET (fillfactor = 50);
ALTER TABLE submissions SET (fillfactor = 70);
ALTER TABLE workers SET (fillfactor = 70);

INSERT INTO settings (group_name) VALUES ('Nightcone');
INSERT INTO turn_clock DEFAULT VALUES;

CREATE FUNCTION queue.settings() RETURNS settings STABLE LANGUAGE sql AS $$
  SELECT * FROM settings ORDER BY version DESC LIMIT 1
$$;

-- the only way a balance changes: the entry and its three sums in one go
CREATE FUNCTION queue.post(balance uuid, kind text, granted bigint, reserved bigint, used bigint, reason text,
                           submission uuid DEFAULT NULL, chunk uuid DEFAULT NULL) RETURNS void LANGUAGE plpgsql AS $$
DECLARE person uuid;
BEGIN
  UPDATE quota_balances b SET granted_ms = b.granted_ms + granted, reserved_ms = b.reserved_ms + reserved, used_ms = b.used_ms + used
    WHERE b.id = balance RETURNING b.account_id INTO STRICT person;
  INSERT INTO quota_entries (balance_id, kind, granted_ms, reserved_ms, used_ms, reason, submission_id, chunk_id)
    VALUES (balance, kind, granted, reserved, used, reason, submission, chunk);
  PERFORM pg_notify('nightcone', 'quota ' || person);
END $$;

-- reserve if it fits; false if it does not
CREATE FUNCTION queue.reserve(balance uuid, ms bigint, reason text, submission uuid) RETURNS boolean LANGUAGE plpgsql AS $$
BEGIN
  IF ms = 0 THEN RETURN true; END IF;
  PERFORM FROM quota_balances b WHERE b.id = balance AND b.granted_ms - b.used_ms - b.reserved_ms >= ms FOR NO KEY UPDATE;
  IF NOT FOUND THEN RETURN false; END IF;
  PERFORM queue.post(balance, 'reserve', 0, ms, 0, reason, submission);
  RETURN true;
END $$;

-- this week's balance of a person; opens the week with its grant, less what the week before was overrun by
CREATE FUNCTION queue.balance_of(person uuid, moment timestamptz DEFAULT now()) RETURNS uuid LANGUAGE plpgsql AS $$
DECLARE
  s settings := queue.settings();
  monday timestamp := date_trunc('week', moment AT TIME ZONE s.time_zone);
  found_id uuid;
  grant_ms bigint;
  overrun bigint;
BEGIN
  SELECT id INTO found_id FROM quota_balances
    WHERE account_id = person AND week_start <= moment AND moment < week_end ORDER BY week_start DESC LIMIT 1;
  IF FOUND THEN RETURN found_id; END IF;
  SELECT greatest(0, used_ms - granted_ms) INTO overrun FROM quota_balances
    WHERE account_id = person AND week_start < moment ORDER BY week_start DESC LIMIT 1;
  INSERT INTO quota_balances (account_id, week_start, week_end)
    VALUES (person, monday AT TIME ZONE s.time_zone, (monday + interval '7 days') AT TIME ZONE s.time_zone)
    ON CONFLICT (account_id, week_start) DO NOTHING RETURNING id INTO found_id;
  IF found_id IS NULL THEN
    SELECT id INTO STRICT found_id FROM quota_balances WHERE account_id = person AND week_start = monday AT TIME ZONE s.time_zone;
    RETURN found_id;
  END IF;
  SELECT coalesce((SELECT weekly_grant_ms FROM turns WHERE account_id = person), s.weekly_grant_ms) INTO grant_ms;
  PERFORM queue.post(found_id, 'grant', grant_ms, 0, 0, 'weekly grant');
  IF overrun > 0 AND grant_ms > 0 THEN
    PERFORM queue.post(found_id, 'adjust', -least(overrun, grant_ms), 0, 0, 'overrun of the week before');
  END IF;
  RETURN found_id;
END $$;
