-- What happens to points: they end, they wait for the same job of somebody else, they go back to the backlog.
-- Lock order everywhere: lease, chunk, submission (several in order of id), jobs (in order of hash), balance.

-- is another submission computing this job at this moment, that is with a lease on one of its parts?
CREATE FUNCTION queue.leased_elsewhere(job text, mine uuid) RETURNS boolean STABLE LANGUAGE sql AS $$
  SELECT EXISTS (
    SELECT FROM executions e
    JOIN submissions s ON s.id = e.submission_id
    JOIN chunks c ON c.submission_id = e.submission_id AND c.state = 'open' AND c.parts && queue.parts_of(ARRAY[e.point], s.parts_per_job)
    JOIN leases l ON l.chunk_id = c.id
    WHERE e.job_hash = job AND e.state = 'running' AND e.submission_id <> mine)
$$;

-- moves CPU and slices from what was reserved to what is used, and releases the reservation in step with the slices left
CREATE FUNCTION queue.settle(submission uuid, chunk uuid, more_us bigint, more_slices bigint, reason text) RETURNS void LANGUAGE plpgsql AS $$
DECLARE
  s submissions;
  ms bigint;
  give bigint;
BEGIN
  SELECT * INTO STRICT s FROM submissions WHERE id = submission FOR NO KEY UPDATE;
  ms := (s.used_us + more_us) / 1000 - s.used_us / 1000;
  give := greatest(0, s.reserved_ms - CASE WHEN s.total_slices > s.done_slices + more_slices
    THEN ceil(s.reserved_at_start_ms::numeric * (s.total_slices - s.done_slices - more_slices) / s.total_slices)::bigint ELSE 0 END);
  UPDATE submissions SET used_us = used_us + more_us, done_slices = done_slices + more_slices, reserved_ms = reserved_ms - give WHERE id = submission;
  IF ms > 0 THEN
    PERFORM queue.post(s.balance_id, 'settle', 0, -give, ms, reason, submission, chunk);
  ELSIF give > 0 THEN
    PERFORM queue.post(s.balance_id, 'release', 0, -give, 0, reason, submission, chunk);
  END IF;
END $$;

-- a job without any running execution is waiting again
CREATE FUNCTION queue.rest_jobs(hashes text[]) RETURNS void LANGUAGE plpgsql AS $$
BEGIN
  PERFORM FROM jobs j WHERE j.hash = ANY (hashes) AND j.state = 'running' ORDER BY j.hash FOR NO KEY UPDATE;
  UPDATE jobs j SET state = 'waiting' WHERE j.hash = ANY (hashes) AND j.state = 'running'
    AND NOT EXISTS (SELECT FROM executions e WHERE e.job_hash = j.hash AND e.state = 'running' AND e.started_at IS NOT NULL);
END $$;

-- the payloads of points that need them no more
CREATE FUNCTION queue.drop_payloads(submission uuid, parts_per_job int, points int[]) RETURNS void LANGUAGE sql AS $$
  DELETE FROM part_rows r USING unnest(points) p
  WHERE r.submission_id = submission AND r.index >= p * (parts_per_job + 1) AND r.index < (p + 1) * (parts_per_job + 1)
$$;

-- points end: their outcome is set once, what is left of them leaves the backlog. Returns the slices nobody will compute
CREATE FUNCTION queue.conclude(submission uuid, concluded int[], result text) RETURNS bigint LANGUAGE plpgsql AS $$
DECLARE
  s submissions;
  ended int[];
  stopped text[];
  dropped bigint;
BEGIN
  SELECT * INTO STRICT s FROM submissions WHERE id = submission FOR NO KEY UPDATE;
  WITH p AS (UPDATE submission_points SET outcome = result WHERE submission_id = submission AND point = ANY (concluded) AND outcome IS NULL RETURNING point)
    SELECT array_agg(point) INTO ended FROM p;
  IF ended IS NULL THEN RETURN 0; END IF;
  UPDATE submissions SET todo = todo - queue.parts_of(ended, parts_per_job), held = held - queue.parts_of(ended, parts_per_job),
      done_points = done_points + cardinality(ended),
      failed_points = failed_points + CASE WHEN result IN ('failed', 'broken-off') THEN cardinality(ended) ELSE 0 END
    WHERE id = submission;
  -- an execution that is still running here was overtaken by another submission's
  WITH e AS (UPDATE executions SET state = 'cancelled', finished_at = now()
      WHERE submission_id = submission AND point = ANY (ended) AND state = 'running' RETURNING job_hash)
    SELECT array_agg(job_hash) INTO stopped FROM e;
  IF stopped IS NOT NULL THEN PERFORM queue.rest_jobs(stopped); END IF;
  -- broken-off points keep the payloads of their other parts, for a retry by hand
  IF s.parts_per_job > 1 AND result <> 'broken-off' THEN PERFORM queue.drop_payloads(submission, s.parts_per_job, ended); END IF;
  SELECT sum(j.slices - coalesce(r.computed, 0)) INTO dropped
    FROM submission_points sp JOIN jobs j ON j.hash = sp.job_hash,
      LATERAL (SELECT sum(queue.slices_of(p.index, s.parts_per_job, j.slices)) AS computed FROM parts p
        WHERE p.submission_id = submission AND p.index >= sp.point * queue.width(s.parts_per_job) AND p.index < (sp.point + 1) * queue.width(s.parts_per_job)) r
    WHERE sp.submission_id = submission AND sp.point = ANY (ended);
  RETURN dropped;
END $$;

-- the end of a submission: nothing to do, nothing running, nothing parked; or cancelled and nothing running
CREATE FUNCTION queue.end_if_empty(submission uuid) RETURNS boolean LANGUAGE plpgsql AS $$
DECLARE
  s submissions;
  stopped text[];
BEGIN
  SELECT * INTO STRICT s FROM submissions WHERE id = submission FOR NO KEY UPDATE;
  IF s.finished_at IS NOT NULL OR s.open_chunks > 0 OR s.state NOT IN ('active', 'paused', 'cancelled')
    OR (s.state <> 'cancelled' AND NOT (isempty(s.todo) AND isempty(s.held) AND s.parked_points = 0)) THEN RETURN false; END IF;
  IF s.state = 'cancelled' THEN
    WITH e AS (UPDATE executions SET state = 'cancelled', finished_at = now() WHERE submission_id = submission AND state = 'running' RETURNING job_hash)
      SELECT array_agg(job_hash) INTO stopped FROM e;
    PERFORM queue.rest_jobs(stopped);
    DELETE FROM part_rows WHERE submission_id = submission;
  END IF;
  UPDATE submissions SET state = CASE state WHEN 'cancelled' THEN state ELSE 'done' END, finished_at = now(), reserved_ms = 0 WHERE id = submission;
  IF s.reserved_ms > 0 THEN
    PERFORM queue.post(s.balance_id, 'release', 0, -s.reserved_ms, 0, 'rest of the reservation', submission);
  END IF;
  PERFORM pg_notify('nightcone', 'submission ' || submission);
  RETURN true;
END $$;

-- parts that were handed out and not computed: their executions have not been, unless parts of them are recorded or running
CREATE FUNCTION queue.unstart(submission uuid, back int4multirange) RETURNS void LANGUAGE plpgsql AS $$
DECLARE
  s submissions;
  idle uuid[];
  hashes text[];
BEGIN
  SELECT * INTO STRICT s FROM submissions WHERE id = submission;
  SELECT array_agg(e.id), array_agg(e.job_hash) INTO idle, hashes FROM executions e
    WHERE e.submission_id = submission AND e.state = 'running'
      AND e.point IN (SELECT DISTINCT i / queue.width(s.parts_per_job) FROM queue.numbers(back) i)
      AND NOT EXISTS (SELECT FROM parts p WHERE p.submission_id = submission
        AND p.index >= e.point * queue.width(s.parts_per_job) AND p.index < (e.point + 1) * queue.width(s.parts_per_job))
      AND NOT EXISTS (SELECT FROM chunks c WHERE c.submission_id = submission AND c.state = 'open'
        AND (c.parts - back) && queue.parts_of(ARRAY[e.point], s.parts_per_job));
  IF idle IS NULL THEN RETURN; END IF;
  -- a re-run was asked for by its id, which stays; so does one that something has happened to
  UPDATE executions SET started_at = NULL WHERE id = ANY (idle)
    AND (reason <> 'first' OR EXISTS (SELECT FROM execution_events v WHERE v.execution_id = executions.id));
  DELETE FROM executions WHERE id = ANY (idle) AND started_at IS NOT NULL;
  PERFORM queue.rest_jobs(hashes);
END $$;

-- of parts about to start, those to compute. Jobs finished meanwhile are reused, jobs that others compute now are parked
CREATE FUNCTION queue.set_aside(submission uuid, batch int4multirange) RETURNS int4multirange LANGUAGE plpgsql AS $$
DECLARE
  s submissions;
  finished int[];
  failed int[];
  parked int[];
  aside int4multirange;
BEGIN
  SELECT * INTO STRICT s FROM submissions WHERE id = submission;
  IF s.kind = 're-run' THEN RETURN batch; END IF;
  SELECT array_agg(p.point) FILTER (WHERE j.state IN ('finished', 'disputed')), array_agg(p.point) FILTER (WHERE j.state = 'failed'),
         array_agg(p.point) FILTER (WHERE j.state = 'running' AND queue.leased_elsewhere(j.hash, submission))
    INTO finished, failed, parked
    FROM (SELECT DISTINCT i / queue.width(s.parts_per_job) AS point FROM queue.numbers(batch) i) p
    JOIN submission_points sp ON sp.submission_id = submission AND sp.point = p.point
    JOIN jobs j ON j.hash = sp.job_hash
    WHERE j.state <> 'waiting';
  IF finished IS NULL AND failed IS NULL AND parked IS NULL THEN RETURN batch; END IF;
  IF finished IS NOT NULL OR failed IS NOT NULL THEN
    -- where some are known, more may be: take them out in one go
    SELECT array_agg(p.point) FILTER (WHERE j.state IN ('finished', 'disputed')), array_agg(p.point) FILTER (WHERE j.state = 'failed')
      INTO finished, failed
      FROM (SELECT DISTINCT i / queue.width(s.parts_per_job) AS point FROM queue.numbers(queue.take(s.todo, 5000)) i) p
      JOIN submission_points sp ON sp.submission_id = submission AND sp.point = p.point
      JOIN jobs j ON j.hash = sp.job_hash
      WHERE j.state IN ('finished', 'disputed', 'failed');
  END IF;
  PERFORM queue.settle(submission, NULL, 0, queue.conclude(submission, finished, 'reused') + queue.conclude(submission, failed, 'failed'), 'computed by another submission');
  -- only what waits can be parked; parts of the same job that are running in this submission go on
  aside := queue.parts_of(parked, s.parts_per_job) * s.todo;
  INSERT INTO parked_points (submission_id, point, job_hash, parts)
    SELECT submission, p, sp.job_hash, queue.parts_of(ARRAY[p], s.parts_per_job) * s.todo
    FROM unnest(parked) p JOIN submission_points sp ON sp.submission_id = submission AND sp.point = p;
  UPDATE submissions SET todo = todo - aside, parked_points = parked_points + coalesce(cardinality(parked), 0) WHERE id = submission;
  RETURN batch - aside - queue.parts_of(finished, s.parts_per_job) - queue.parts_of(failed, s.parts_per_job);
END $$;

-- parked points whose job is finished are reused; those whose job nobody computes any more go back to the backlog
CREATE FUNCTION queue.unpark() RETURNS void LANGUAGE plpgsql AS $$
DECLARE r record;
BEGIN
  FOR r IN
    SELECT w.submission_id, array_agg(w.point) AS points, range_agg(w.parts) FILTER (WHERE w.fate = 'back') AS back,
           array_agg(w.point) FILTER (WHERE w.fate = 'reused') AS reused, array_agg(w.point) FILTER (WHERE w.fate = 'failed') AS failed
    FROM (SELECT p.submission_id, p.point, p.parts,
        CASE WHEN j.state IN ('finished', 'disputed') THEN 'reused' WHEN j.state = 'failed' THEN 'failed'
             WHEN NOT queue.leased_elsewhere(p.job_hash, p.submission_id) THEN 'back' END AS fate
      FROM parked_points p JOIN jobs j ON j.hash = p.job_hash) w
    WHERE w.fate IS NOT NULL GROUP BY w.submission_id ORDER BY w.submission_id
  LOOP
    PERFORM FROM submissions WHERE id = r.submission_id FOR NO KEY UPDATE;
    DELETE FROM parked_points WHERE submission_id = r.submission_id AND point = ANY (r.points);
    -- a cancel that came first has dropped them already
    CONTINUE WHEN NOT FOUND;
    UPDATE submissions SET parked_points = parked_points - cardinality(r.points), todo = todo + coalesce(r.back, '{}') WHERE id = r.submission_id;
    PERFORM queue.settle(r.submission_id, NULL, 0, queue.conclude(r.submission_id, r.reused, 'reused') + queue.conclude(r.submission_id, r.failed, 'failed'), 'computed by another submission');
    PERFORM queue.end_if_empty(r.submission_id);
    PERFORM pg_notify('nightcone', 'submission ' || r.submission_id);
  END LOOP;
END $$;
