-- How a submission gets its backlog.

-- A submission whose points are saved opens: parts per job (about 2 s each, so that a long job runs in parallel and
-- survives a crash, and a cheap one is one part), backlog, totals. Tells how many points are known and what to reserve.
CREATE FUNCTION queue.open(submission uuid, OUT known int, OUT reserved_ms bigint) LANGUAGE plpgsql AS $$
DECLARE
  t record;
  parts int;
  backlog int4multirange;
BEGIN
  SELECT count(*)::int AS points, count(p.outcome)::int AS known, count(*) FILTER (WHERE p.outcome = 'failed')::int AS failed,
         coalesce(sum(j.estimated_ms) FILTER (WHERE p.outcome IS NULL), 0) AS estimated_ms,
         coalesce(max(j.estimated_ms) FILTER (WHERE p.outcome IS NULL), 0) AS largest_ms,
         coalesce(sum(j.slices) FILTER (WHERE p.outcome IS NULL), 0) AS slices,
         coalesce(max(j.slices) FILTER (WHERE p.outcome IS NULL), 1) AS most_slices,
         coalesce(max(j.memory_bytes) FILTER (WHERE p.outcome IS NULL), 0) AS memory_bytes
    INTO t FROM submission_points p JOIN jobs j ON j.hash = p.job_hash WHERE p.submission_id = submission;
  -- all part numbers, with an assembly for every job, stay below 2^31
  parts := greatest(1, least(ceil(t.largest_ms / (queue.settings()).chunk_ms), t.most_slices, 2147483647 / t.points - 1))::int;
  IF parts = 1 THEN
    SELECT range_agg(int4range(p.point, p.point + 1)) INTO backlog FROM submission_points p WHERE p.submission_id = submission AND p.outcome IS NULL;
  ELSE
    SELECT range_agg(int4range(i, i + 1)) INTO backlog
      FROM submission_points p JOIN jobs j ON j.hash = p.job_hash, generate_series(p.point * (parts + 1), p.point * (parts + 1) + parts - 1) i
      WHERE p.submission_id = submission AND p.outcome IS NULL AND queue.slices_of(i, parts, j.slices) > 0;
  END IF;
  known := t.known;
  reserved_ms := ceil(t.estimated_ms);
  UPDATE submissions s SET points = t.points, parts_per_job = parts, todo = coalesce(backlog, '{}'), total_slices = t.slices,
      done_points = t.known, failed_points = t.failed, estimated_ms = t.estimated_ms,
      part_ms = t.estimated_ms / greatest(1, queue.size(backlog)), memory_bytes = t.memory_bytes,
      reserved_at_start_ms = open.reserved_ms, reserved_ms = open.reserved_ms
    WHERE s.id = submission;
  IF backlog IS NULL THEN
    UPDATE submissions SET state = 'done', finished_at = now() WHERE id = submission;
  END IF;
  PERFORM pg_notify('nightcone', 'work'), pg_notify('nightcone', 'submission ' || submission);
END $$;
