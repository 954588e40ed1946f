-- How finished parts are recorded: fenced by the lease, once, together with everything that follows from it.

CREATE TYPE queue.part_row AS (index int, cpu_us bigint, outcome text, code text, text text, digest text, arrays jsonb, certificate jsonb, bytes bigint);
CREATE TYPE queue.execution_end AS (execution_id uuid, job_hash text, point int, digest text, code text, text text);

-- an execution has ended: what its job is now
CREATE FUNCTION queue.judge_jobs(ended queue.execution_end[]) RETURNS void LANGUAGE plpgsql AS $$
DECLARE r record;
BEGIN
  PERFORM FROM jobs j WHERE j.hash IN (SELECT job_hash FROM unnest(ended)) ORDER BY j.hash FOR NO KEY UPDATE;
  -- the first result, or the first deterministic failure, is the job's
  UPDATE jobs j SET state = CASE WHEN f.digest IS NULL THEN 'failed' ELSE 'finished' END, result_digest = f.digest,
      failure_code = f.code, failure_text = f.text, finished_at = now(), cpu_ms = f.cpu_ms
    FROM (SELECT DISTINCT ON (t.job_hash) t.*, c.cpu_ms FROM unnest(ended) t,
        LATERAL (SELECT sum(p.cpu_us * p.speed_factor) / 1000 AS cpu_ms FROM parts p WHERE p.execution_id = t.execution_id) c
      ORDER BY t.job_hash, t.point) f
    WHERE j.hash = f.job_hash AND j.state IN ('waiting', 'running');
  -- any later one under the same kernel must give the same bits
  FOR r IN
    UPDATE jobs j SET state = 'disputed' FROM unnest(ended) t
    WHERE j.hash = t.job_hash AND j.state = 'finished' AND t.digest IS DISTINCT FROM j.result_digest
    RETURNING j.hash, j.result_digest, t.digest, t.code, t.execution_id
  LOOP
    INSERT INTO audit_entries (action, subject, subject_id, before, after)
      VALUES ('jobs.dispute', 'job', r.hash, jsonb_build_object('resultDigest', r.result_digest),
        jsonb_build_object('resultDigest', r.digest, 'failure', r.code, 'execution', r.execution_id));
  END LOOP;
  -- a failure is final: a result after it changes nothing, but somebody must look
  INSERT INTO audit_entries (action, subject, subject_id, before, after)
    SELECT 'jobs.dispute', 'job', j.hash, jsonb_build_object('failure', j.failure_code), jsonb_build_object('resultDigest', t.digest, 'execution', t.execution_id)
    FROM unnest(ended) t JOIN jobs j ON j.hash = t.job_hash WHERE j.state = 'failed' AND t.digest IS NOT NULL;
END $$;

-- the assembly of a job enters the backlog when all its other parts are recorded
CREATE FUNCTION queue.add_assemblies(submission uuid, points_now int[]) RETURNS void LANGUAGE plpgsql AS $$
DECLARE
  s submissions;
  ready int4multirange;
BEGIN
  SELECT * INTO STRICT s FROM submissions WHERE id = submission;
  SELECT range_agg(int4range(a, a + 1)) INTO ready FROM (
    SELECT sp.point * (s.parts_per_job + 1) + s.parts_per_job AS a
    FROM submission_points sp JOIN jobs j ON j.hash = sp.job_hash
    WHERE sp.submission_id = submission AND sp.point = ANY (points_now) AND sp.outcome IS NULL
      AND (SELECT count(*) FROM parts p WHERE p.submission_id = submission AND p.outcome = 'payloads'
        AND p.index >= sp.point * (s.parts_per_job + 1) AND p.index < sp.point * (s.parts_per_job + 1) + s.parts_per_job)
        = least(s.parts_per_job, j.slices)) x;
  IF ready IS NULL THEN RETURN; END IF;
  UPDATE submissions SET todo = todo + ready WHERE id = submission;
  PERFORM pg_notify('nightcone', 'work');
END $$;

-- Records finished parts. Idempotent; 'lost' when the lease is another's: then nothing is written.
CREATE FUNCTION queue.record(chunk uuid, att int, worker_id text, factor float8, given jsonb) RETURNS text LANGUAGE plpgsql AS $$
DECLARE
  l leases;
  k chunks;
  s submissions;
  rows queue.part_row[];
  ended queue.execution_end[];
  fresh int[];
  used bigint;
  slices bigint;
BEGIN
  UPDATE leases SET beat_at = now() WHERE chunk_id = chunk AND attempt = att RETURNING * INTO l;
  IF NOT FOUND THEN RETURN 'lost'; END IF;
  SELECT * INTO STRICT k FROM chunks WHERE id = chunk FOR NO KEY UPDATE;
  SELECT * INTO STRICT s FROM submissions WHERE id = l.submission_id FOR NO KEY UPDATE;
  rows := ARRAY(SELECT r FROM jsonb_populate_recordset(NULL::queue.part_row, given) r WHERE k.parts @> r.index);

  WITH p AS (
    INSERT INTO parts (submission_id, index, execution_id, outcome, attempt, worker, cpu_us, speed_factor)
    SELECT s.id, r.index, e.id, r.outcome, att, worker_id, r.cpu_us, factor FROM unnest(rows) r,
      LATERAL (SELECT id FROM executions WHERE submission_id = s.id AND point = r.index / queue.width(s.parts_per_job)
        ORDER BY (state = 'running') DESC, created_at DESC LIMIT 1) e
    ORDER BY r.index ON CONFLICT DO NOTHING RETURNING index)
    SELECT array_agg(index) INTO fresh FROM p;
  IF fresh IS NULL THEN RETURN queue.advice(s.id); END IF;
  rows := ARRAY(SELECT r FROM unnest(rows) r WHERE r.index = ANY (fresh));

  SELECT sum(round(r.cpu_us * factor)), sum(queue.slices_of(r.index, s.parts_per_job, j.slices)) INTO used, slices
    FROM unnest(rows) r JOIN submission_points sp ON sp.submission_id = s.id AND sp.point = r.index / queue.width(s.parts_per_job)
    JOIN jobs j ON j.hash = sp.job_hash;
  UPDATE chunks SET used_us = used_us + used WHERE id = chunk;
  UPDATE executions e SET cpu_us = e.cpu_us + c.cpu_us FROM (
      SELECT p.execution_id, sum(p.cpu_us) AS cpu_us FROM parts p WHERE p.submission_id = s.id AND p.index = ANY (fresh) GROUP BY p.execution_id) c
    WHERE e.id = c.execution_id;

  INSERT INTO results (digest, arrays, certificate, bytes)
    SELECT DISTINCT ON (r.digest) r.digest, r.arrays, r.certificate, r.bytes FROM unnest(rows) r WHERE r.outcome = 'result' ORDER BY r.digest
    ON CONFLICT DO NOTHING;
  WITH e AS (
    UPDATE executions x SET state = CASE r.outcome WHEN 'result' THEN 'finished' ELSE 'failed' END, finished_at = now(),
      result_digest = r.digest, failure_code = r.code, failure_text = r.text
    FROM unnest(rows) r
    WHERE r.outcome <> 'payloads' AND x.submission_id = s.id AND x.point = r.index / queue.width(s.parts_per_job) AND x.state = 'running'
    RETURNING ROW(x.id, x.job_hash, x.point, x.result_digest, x.failure_code, x.failure_text)::queue.execution_end AS end_row)
    SELECT array_agg(end_row) INTO ended FROM e;
  PERFORM queue.judge_jobs(ended);
  PERFORM queue.settle(s.id, chunk, used, slices
    + queue.conclude(s.id, ARRAY(SELECT point FROM unnest(ended) WHERE digest IS NOT NULL), 'finished')
    + queue.conclude(s.id, ARRAY(SELECT point FROM unnest(ended) WHERE digest IS NULL), 'failed'), 'computed');

  IF s.parts_per_job > 1 THEN
    -- a part that was on its way when its job ended is not assembled any more
    PERFORM queue.drop_payloads(s.id, s.parts_per_job, ARRAY(SELECT sp.point FROM submission_points sp
      WHERE sp.submission_id = s.id AND sp.outcome <> 'broken-off'
        AND sp.point IN (SELECT r.index / (s.parts_per_job + 1) FROM unnest(rows) r)));
    PERFORM queue.add_assemblies(s.id, ARRAY(SELECT DISTINCT r.index / (s.parts_per_job + 1) FROM unnest(rows) r WHERE r.outcome = 'payloads'));
  END IF;

  PERFORM pg_notify('nightcone', 'submission ' || s.id);
  PERFORM pg_notify('nightcone', 'job ' || job_hash) FROM unnest(ended);
  IF EXISTS (SELECT FROM parked_points p JOIN unnest(ended) t ON t.job_hash = p.job_hash) THEN PERFORM pg_notify('nightcone', 'work'); END IF;
  RETURN queue.advice(s.id);
END $$;
