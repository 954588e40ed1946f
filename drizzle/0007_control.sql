-- What people do with their submissions. Each returns whether it changed anything: a lost race is told, not hidden.

CREATE FUNCTION queue.pause(submission uuid) RETURNS boolean LANGUAGE plpgsql AS $$
BEGIN
  UPDATE submissions SET state = 'paused' WHERE id = submission AND state = 'active';
  IF NOT FOUND THEN RETURN false; END IF;
  PERFORM pg_notify('nightcone', 'pause ' || submission), pg_notify('nightcone', 'submission ' || submission);
  RETURN true;
END $$;

CREATE FUNCTION queue.resume(submission uuid) RETURNS boolean LANGUAGE plpgsql AS $$
BEGIN
  UPDATE submissions SET state = 'active' WHERE id = submission AND state = 'paused';
  IF NOT FOUND THEN RETURN false; END IF;
  PERFORM pg_notify('nightcone', 'work'), pg_notify('nightcone', 'submission ' || submission);
  RETURN true;
END $$;

-- nothing of it starts any more; what is running is told to stop, and the last chunk that closes settles the rest
CREATE FUNCTION queue.cancel(submission uuid) RETURNS boolean LANGUAGE plpgsql AS $$
BEGIN
  UPDATE submissions SET state = 'cancelled', todo = '{}', held = '{}', parked_points = 0 WHERE id = submission AND state IN ('active', 'paused');
  IF NOT FOUND THEN RETURN false; END IF;
  DELETE FROM parked_points WHERE submission_id = submission;
  PERFORM queue.end_if_empty(submission);
  PERFORM pg_notify('nightcone', 'cancel ' || submission), pg_notify('nightcone', 'submission ' || submission);
  RETURN true;
END $$;

-- broken-off points go back to the backlog; the reservation grows again by what they need. If the quota is short by that
-- much, short_ms says so, and the caller must roll back
CREATE FUNCTION queue.retry_broken_off(submission uuid, OUT points int, OUT short_ms bigint) LANGUAGE plpgsql AS $$
DECLARE
  s submissions;
  again int[];
  back int4multirange;
  slices bigint;
  more bigint;
BEGIN
  points := 0;
  short_ms := 0;
  SELECT * INTO STRICT s FROM submissions WHERE id = submission FOR NO KEY UPDATE;
  IF s.state = 'cancelled' THEN RETURN; END IF;
  WITH p AS (UPDATE submission_points SET outcome = NULL WHERE submission_id = submission AND outcome = 'broken-off' RETURNING point)
    SELECT array_agg(point) INTO again FROM p;
  IF again IS NULL THEN RETURN; END IF;
  SELECT range_agg(int4range(i, i + 1)), sum(queue.slices_of(i, s.parts_per_job, j.slices)) INTO back, slices
    FROM queue.numbers(queue.parts_of(again, s.parts_per_job)) i
    JOIN submission_points sp ON sp.submission_id = submission AND sp.point = i / queue.width(s.parts_per_job)
    JOIN jobs j ON j.hash = sp.job_hash
    WHERE NOT EXISTS (SELECT FROM parts p WHERE p.submission_id = submission AND p.index = i)
      AND queue.slices_of(i, s.parts_per_job, j.slices) > 0;
  -- the assembly broke: it alone is done again
  slices := coalesce(slices, 0);
  IF s.state = 'done' THEN
    UPDATE submissions SET balance_id = queue.balance_of(account_id) WHERE id = submission RETURNING balance_id INTO s.balance_id;
  END IF;
  more := greatest(0, ceil(s.reserved_at_start_ms::numeric * greatest(0, s.total_slices - s.done_slices + slices) / greatest(1, s.total_slices))::bigint - s.reserved_ms);
  IF NOT queue.reserve(s.balance_id, more, 'retry of broken-off points', submission) THEN
    short_ms := more;
    RETURN;
  END IF;
  UPDATE submissions SET state = CASE state WHEN 'done' THEN 'active' ELSE state END, finished_at = NULL, todo = todo + coalesce(back, '{}'),
      done_slices = done_slices - slices, reserved_ms = reserved_ms + more,
      done_points = done_points - cardinality(again), failed_points = failed_points - cardinality(again)
    WHERE id = submission;
  IF s.parts_per_job > 1 THEN PERFORM queue.add_assemblies(submission, again); END IF;
  PERFORM pg_notify('nightcone', 'work'), pg_notify('nightcone', 'submission ' || submission);
  points := cardinality(again);
END $$;

-- how each point of a submission stands, in one word
CREATE VIEW point_states AS
  SELECT sp.submission_id, sp.point, sp.place, sp.job_hash, sp.swept_values,
    CASE WHEN sp.outcome IS NOT NULL THEN sp.outcome
      WHEN EXISTS (SELECT FROM executions e WHERE e.submission_id = sp.submission_id AND e.point = sp.point AND e.state = 'running' AND e.started_at IS NOT NULL) THEN 'running'
      WHEN s.state = 'cancelled' THEN 'cancelled'
      WHEN s.held @> (sp.point * queue.width(s.parts_per_job)) THEN 'held'
      WHEN s.parked_points > 0 AND EXISTS (SELECT FROM parked_points p WHERE p.submission_id = sp.submission_id AND p.point = sp.point) THEN 'parked'
      ELSE 'waiting' END AS state
  FROM submission_points sp JOIN submissions s ON s.id = sp.submission_id;
