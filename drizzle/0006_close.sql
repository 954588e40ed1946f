-- How attempts and chunks end: in good order, by a crash, by silence.

-- closes an open chunk whose lease has ended: what is not recorded goes back, or is dropped if cancelled
CREATE FUNCTION queue.close(chunk uuid, ending text DEFAULT 'done') RETURNS boolean LANGUAGE plpgsql AS $$
DECLARE
  k chunks;
  s submissions;
  recorded int;
  off_by float8;
BEGIN
  SELECT * INTO k FROM chunks WHERE id = chunk AND state = 'open' FOR NO KEY UPDATE;
  IF NOT FOUND THEN RETURN false; END IF;
  SELECT * INTO STRICT s FROM submissions WHERE id = k.submission_id FOR NO KEY UPDATE;
  recorded := queue.size(queue.recorded(k));
  IF s.state = 'cancelled' THEN
    ending := 'cancelled';
  ELSE
    PERFORM queue.give_back(chunk, k.parts - queue.recorded(k));
  END IF;
  UPDATE chunks SET state = ending, closed_at = now() WHERE id = chunk;
  -- virtual time was charged by the estimate: correct it by what was used
  off_by := k.used_us / 1000.0 - k.estimated_ms;
  UPDATE submissions SET open_chunks = open_chunks - 1, virtual_time = virtual_time + off_by,
      part_ms = CASE WHEN recorded > 0 THEN (part_ms + k.used_us / 1000.0 / recorded) / 2 ELSE part_ms END
    WHERE id = s.id;
  UPDATE turns SET running = running - 1, virtual_time = virtual_time + off_by / weight WHERE account_id = k.account_id;
  IF NOT queue.end_if_empty(s.id) THEN PERFORM pg_notify('nightcone', 'submission ' || s.id); END IF;
  PERFORM pg_notify('nightcone', 'work');
  RETURN true;
END $$;

-- An attempt broke. When it was the last, the suspect part ends as broken off and the rest of the chunk goes back.
CREATE FUNCTION queue.break_off(chunk uuid, why text, lost bigint, last_attempt boolean) RETURNS void LANGUAGE plpgsql AS $$
DECLARE
  k chunks;
  s submissions;
  suspect int;
  stopped text;
BEGIN
  SELECT * INTO k FROM chunks WHERE id = chunk AND state = 'open' FOR NO KEY UPDATE;
  IF NOT FOUND THEN RETURN; END IF;
  SELECT * INTO STRICT s FROM submissions WHERE id = k.submission_id FOR NO KEY UPDATE;
  UPDATE submissions SET lost_us = lost_us + greatest(0, lost - coalesce((SELECT sum(p.cpu_us) FROM parts p
      WHERE p.submission_id = s.id AND k.parts @> p.index AND p.attempt = k.attempt), 0)) WHERE id = s.id;
  suspect := lower(k.parts - queue.recorded(k)) / queue.width(s.parts_per_job);
  IF suspect IS NOT NULL THEN
    INSERT INTO execution_events (execution_id, text)
      SELECT id, format('attempt %s ended: %s', k.attempt, why) FROM executions
      WHERE submission_id = s.id AND point = suspect AND state = 'running';
  END IF;
  IF NOT last_attempt THEN
    PERFORM pg_notify('nightcone', 'submission ' || s.id);
    RETURN;
  END IF;
  IF suspect IS NOT NULL AND s.state <> 'cancelled' THEN
    UPDATE executions SET state = 'broken-off', finished_at = now(), failure_code = 'broken-off', failure_text = why
      WHERE submission_id = s.id AND point = suspect AND state = 'running' RETURNING job_hash INTO stopped;
    PERFORM queue.rest_jobs(ARRAY[stopped]);
    PERFORM queue.settle(s.id, chunk, 0, queue.conclude(s.id, ARRAY[suspect], 'broken-off'), 'broken off');
    PERFORM pg_notify('nightcone', 'job ' || stopped);
  END IF;
  PERFORM queue.close(chunk, 'dead');
END $$;

-- heartbeat of all chunks of one process; an order for each. A lease that is being written at this moment is alive anyway
CREATE FUNCTION queue.beat(ids uuid[], attempts int[], cpus bigint[], fractions real[]) RETURNS TABLE (chunk_id uuid, advice text) LANGUAGE sql AS $$
  WITH given AS (SELECT * FROM unnest(ids, attempts, cpus, fractions) t(id, attempt, cpu_us, fraction)),
  free AS (SELECT l.chunk_id FROM leases l JOIN given g ON g.id = l.chunk_id AND g.attempt = l.attempt ORDER BY l.chunk_id FOR NO KEY UPDATE OF l SKIP LOCKED),
  beaten AS (UPDATE leases l SET beat_at = now(), cpu_us = g.cpu_us, fraction = g.fraction FROM given g, free f
    WHERE l.chunk_id = f.chunk_id AND g.id = l.chunk_id)
  SELECT g.id, coalesce((SELECT queue.advice(l.submission_id) FROM leases l WHERE l.chunk_id = g.id AND l.attempt = g.attempt), 'lost') FROM given g
$$;

-- takes the leases without a heartbeat for so long, and marks workers that are silent
CREATE FUNCTION queue.reap(lease_ms int) RETURNS TABLE (chunk_id uuid, worker text, cpu_us bigint) LANGUAGE plpgsql AS $$
#variable_conflict use_column
DECLARE deadline timestamptz := now() - lease_ms * interval '1 ms';
BEGIN
  UPDATE workers SET state = 'silent' WHERE id IN (
    SELECT id FROM workers WHERE state IN ('active', 'winding-down') AND heartbeat_at < deadline ORDER BY id FOR NO KEY UPDATE SKIP LOCKED);
  RETURN QUERY DELETE FROM leases WHERE chunk_id IN (
    SELECT l.chunk_id FROM leases l WHERE l.beat_at < deadline ORDER BY l.chunk_id FOR UPDATE SKIP LOCKED)
    RETURNING leases.chunk_id, leases.worker, leases.cpu_us;
END $$;
