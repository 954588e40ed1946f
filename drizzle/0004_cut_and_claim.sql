-- How work starts: a chunk is cut at the moment a slot is free, then claimed for one attempt.

-- Work is paid from the week of its submission. What that week cannot pay any more goes on in the present one
CREATE FUNCTION queue.roll_over() RETURNS void LANGUAGE plpgsql AS $$
DECLARE
  r record;
  present uuid;
BEGIN
  FOR r IN
    SELECT s.id, s.account_id FROM submissions s JOIN quota_balances b ON b.id = s.balance_id
    WHERE s.state IN ('active', 'paused') AND b.week_end <= now() AND b.used_ms >= b.granted_ms ORDER BY s.id
  LOOP
    present := queue.balance_of(r.account_id);
    SELECT id, balance_id, reserved_ms INTO STRICT r FROM submissions WHERE id = r.id FOR NO KEY UPDATE;
    CONTINUE WHEN r.balance_id = present;
    UPDATE submissions SET balance_id = present WHERE id = r.id;
    IF r.reserved_ms > 0 THEN
      PERFORM queue.post(r.balance_id, 'release', 0, -r.reserved_ms, 0, 'goes on in the next week', r.id),
              queue.post(present, 'reserve', 0, r.reserved_ms, 0, 'goes on from the week before', r.id);
    END IF;
  END LOOP;
END $$;

-- the only gate through which work starts: cuts at most one chunk, under one lock. Its id, or null
CREATE FUNCTION queue.cut(express boolean, memory bigint) RETURNS uuid LANGUAGE plpgsql AS $$
DECLARE
  settings settings := queue.settings();
  turn record;
  s submissions;
  slots int;
  backlog int;
  n int;
  batch int4multirange;
  chunk uuid;
BEGIN
  PERFORM pg_advisory_xact_lock(7201);
  PERFORM queue.unpark();
  PERFORM queue.roll_over();
  LOOP
    SELECT * INTO turn FROM queue.next_turn(express, memory);
    IF NOT FOUND THEN RETURN NULL; END IF;
    SELECT * INTO STRICT s FROM submissions WHERE id = turn.submission_id FOR NO KEY UPDATE;
    -- it was paused, cancelled or emptied between the choice and the lock
    CONTINUE WHEN s.state <> 'active' OR isempty(s.todo);
    -- chunk_ms of CPU; near the end less, so that the last chunks end together, but not less than 50 ms
    SELECT greatest(1, coalesce(sum(w.slots), 1)) INTO slots FROM workers w WHERE w.state = 'active';
    backlog := queue.size(s.todo);
    n := least(5000, greatest(1, floor(least(settings.chunk_ms / greatest(s.part_ms, 1e-6), 5000))::int),
               greatest(ceil(backlog / (2.0 * slots))::int, ceil(least(50 / greatest(s.part_ms, 1e-6), 5000))::int));
    batch := queue.take(s.todo, n);
    batch := queue.set_aside(s.id, batch);
    IF isempty(batch) THEN
      -- all of it is known, or others are at it
      PERFORM queue.end_if_empty(s.id);
      CONTINUE;
    END IF;
    n := queue.size(batch);
    UPDATE submissions SET todo = todo - batch, open_chunks = open_chunks + 1, started_at = coalesce(started_at, now()),
      virtual_time = turn.own_tag + n * s.part_ms WHERE id = s.id;
    UPDATE turns t SET running = running + 1, clock = turn.own_tag, virtual_time = turn.person_tag + n * s.part_ms / t.weight
      WHERE t.account_id = s.account_id;
    UPDATE turn_clock SET virtual_time = greatest(virtual_time, turn.person_tag);
    INSERT INTO chunks (submission_id, account_id, parts, estimated_ms)
      VALUES (s.id, s.account_id, batch, n * s.part_ms) RETURNING id INTO chunk;
    RETURN chunk;
  END LOOP;
END $$;

-- parts of a chunk that are recorded
CREATE FUNCTION queue.recorded(k chunks) RETURNS int4multirange STABLE LANGUAGE sql AS $$
  SELECT coalesce(range_agg(int4range(p.index, p.index + 1)), '{}') FROM parts p
  WHERE p.submission_id = k.submission_id AND p.index >= lower(k.parts) AND p.index < upper(k.parts) AND k.parts @> p.index
$$;

-- parts of an open chunk go back to the backlog, except those of points that have ended meanwhile
CREATE FUNCTION queue.give_back(chunk uuid, back int4multirange) RETURNS void LANGUAGE plpgsql AS $$
DECLARE
  s submissions;
  ended int[];
BEGIN
  IF isempty(back) THEN RETURN; END IF;
  SELECT x.* INTO STRICT s FROM submissions x JOIN chunks c ON c.submission_id = x.id WHERE c.id = chunk FOR NO KEY UPDATE OF x;
  UPDATE chunks SET parts = parts - back WHERE id = chunk;
  SELECT array_agg(sp.point) INTO ended FROM submission_points sp
    WHERE sp.submission_id = s.id AND sp.outcome IS NOT NULL
      AND sp.point IN (SELECT DISTINCT i / queue.width(s.parts_per_job) FROM queue.numbers(back) i);
  UPDATE submissions SET todo = todo + back - queue.parts_of(ended, parts_per_job) WHERE id = s.id;
  PERFORM queue.unstart(s.id, back);
END $$;

-- An attempt begins: a new fencing token. No rows when the chunk must not run now; then it has been closed.
-- A second attempt takes only the first part that is not recorded: it is the suspect.
CREATE FUNCTION queue.claim(chunk uuid, worker_id text)
RETURNS TABLE (attempt int, submission_id uuid, budget_ms int, part_index int, point int, job_hash text, execution_id uuid,
  specification text, kernel_digest text, slice_from int, slice_to int, slices int, kind text) LANGUAGE plpgsql AS $$
#variable_conflict use_column
DECLARE
  k chunks;
  s submissions;
  mine int4multirange;
  points_now int[];
  w int;
BEGIN
  SELECT * INTO k FROM chunks WHERE id = chunk AND state = 'open' FOR NO KEY UPDATE;
  IF NOT FOUND THEN RETURN; END IF;
  SELECT * INTO STRICT s FROM submissions WHERE id = k.submission_id FOR NO KEY UPDATE;
  w := queue.width(s.parts_per_job);
  mine := k.parts - CASE WHEN k.attempt > 0 THEN queue.recorded(k) ELSE '{}' END;
  IF s.state NOT IN ('active') OR (s.tonight AND NOT queue.is_night()) OR isempty(mine) THEN
    PERFORM queue.close(chunk);
    RETURN;
  END IF;
  IF k.attempt > 0 THEN
    PERFORM queue.give_back(chunk, mine - queue.take(mine, 1));
    mine := queue.take(mine, 1);
  END IF;
  UPDATE chunks SET attempt = k.attempt + 1 WHERE id = chunk;
  INSERT INTO leases (chunk_id, attempt, submission_id, account_id, worker)
    VALUES (chunk, k.attempt + 1, s.id, s.account_id, worker_id)
    ON CONFLICT (chunk_id) DO UPDATE SET attempt = excluded.attempt, worker = excluded.worker, started_at = now(), beat_at = now(), cpu_us = 0, fraction = 0;
  points_now := ARRAY(SELECT DISTINCT i / w FROM queue.numbers(mine) i ORDER BY 1);
  INSERT INTO executions (job_hash, submission_id, point, reason, asked_by, started_at, workers)
    SELECT sp.job_hash, s.id, sp.point, CASE s.kind WHEN 're-run' THEN 're-run' ELSE 'first' END, s.account_id, now(), ARRAY[worker_id]
    FROM submission_points sp WHERE sp.submission_id = s.id AND sp.point = ANY (points_now)
    ON CONFLICT (submission_id, point) WHERE state = 'running' DO UPDATE SET started_at = coalesce(executions.started_at, now()),
      workers = CASE WHEN worker_id = ANY (executions.workers) THEN executions.workers ELSE executions.workers || worker_id END;
  PERFORM FROM jobs j JOIN submission_points sp ON sp.job_hash = j.hash
    WHERE sp.submission_id = s.id AND sp.point = ANY (points_now) AND j.state = 'waiting' ORDER BY j.hash FOR NO KEY UPDATE OF j;
  UPDATE jobs SET state = 'running' FROM submission_points sp
    WHERE sp.submission_id = s.id AND sp.point = ANY (points_now) AND jobs.hash = sp.job_hash AND jobs.state = 'waiting';
  IF k.attempt = 0 AND s.started_at = now() THEN PERFORM pg_notify('nightcone', 'submission ' || s.id); END IF;
  PERFORM pg_notify('nightcone', 'job ' || sp.job_hash) FROM submission_points sp
    WHERE sp.submission_id = s.id AND sp.point = ANY (points_now) AND s.kind <> 'sweep';
  RETURN QUERY
    SELECT k.attempt + 1, s.id, (queue.settings()).chunk_budget_ms, i, sp.point, sp.job_hash, e.id, j.canonical_text, j.kernel_digest,
      CASE WHEN w = 1 THEN 0 WHEN i % w = s.parts_per_job THEN j.slices ELSE queue.slice_from(i % w, s.parts_per_job, j.slices) END,
      CASE WHEN w = 1 OR i % w = s.parts_per_job THEN j.slices ELSE queue.slice_from(i % w + 1, s.parts_per_job, j.slices) END,
      j.slices,
      CASE WHEN w = 1 THEN 'whole' WHEN i % w = s.parts_per_job THEN 'assembly' ELSE 'part' END
    FROM queue.numbers(mine) i
    JOIN submission_points sp ON sp.submission_id = s.id AND sp.point = i / w
    JOIN jobs j ON j.hash = sp.job_hash
    JOIN executions e ON e.submission_id = s.id AND e.point = sp.point AND e.state = 'running'
    ORDER BY i;
END $$;
