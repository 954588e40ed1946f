-- Sets of part numbers, the night window, and the turn order.

-- how many numbers a set holds
CREATE FUNCTION queue.size(m int4multirange) RETURNS int IMMUTABLE LANGUAGE sql AS $$
  SELECT coalesce(sum(upper(r) - lower(r)), 0)::int FROM unnest(m) r
$$;

CREATE FUNCTION queue.numbers(m int4multirange) RETURNS SETOF int IMMUTABLE LANGUAGE sql AS $$
  SELECT g FROM unnest(m) r, generate_series(lower(r), upper(r) - 1) g
$$;

CREATE FUNCTION queue.set_of(numbers int[]) RETURNS int4multirange IMMUTABLE LANGUAGE sql AS $$
  SELECT coalesce(range_agg(int4range(g, g + 1)), '{}') FROM unnest(numbers) g
$$;

-- the first n numbers of a set
CREATE FUNCTION queue.take(m int4multirange, n int) RETURNS int4multirange IMMUTABLE LANGUAGE plpgsql AS $$
DECLARE
  r int4range;
  taken int4range[] := '{}';
  rest int := n;
BEGIN
  FOR r IN SELECT unnest(m) LOOP
    taken := taken || int4range(lower(r), least(upper(r), lower(r) + rest));
    rest := rest - (upper(r) - lower(r));
    EXIT WHEN rest <= 0;
  END LOOP;
  RETURN int4multirange(VARIADIC taken);
END $$;

-- numbers that one job takes in its submission: one, or its parts and the assembly
CREATE FUNCTION queue.width(parts_per_job int) RETURNS int IMMUTABLE LANGUAGE sql AS $$
  SELECT CASE parts_per_job WHEN 1 THEN 1 ELSE parts_per_job + 1 END
$$;

-- all part numbers of some points
CREATE FUNCTION queue.parts_of(points int[], parts_per_job int) RETURNS int4multirange IMMUTABLE LANGUAGE sql AS $$
  SELECT coalesce(range_agg(int4range(p * queue.width(parts_per_job), (p + 1) * queue.width(parts_per_job))), '{}') FROM unnest(points) p
$$;

-- part g of G of a job with n slices begins at this slice
CREATE FUNCTION queue.slice_from(g int, parts_per_job int, n int) RETURNS int IMMUTABLE LANGUAGE sql AS $$
  SELECT (g::bigint * n / parts_per_job)::int
$$;

-- slices that a part computes; none for an assembly
CREATE FUNCTION queue.slices_of(part_index int, parts_per_job int, n int) RETURNS int IMMUTABLE LANGUAGE sql AS $$
  SELECT CASE WHEN parts_per_job = 1 THEN n
    WHEN part_index % (parts_per_job + 1) = parts_per_job THEN 0
    ELSE queue.slice_from(part_index % (parts_per_job + 1) + 1, parts_per_job, n) - queue.slice_from(part_index % (parts_per_job + 1), parts_per_job, n) END
$$;

-- the night window by the clock on the group's wall, so that summer time is right
CREATE FUNCTION queue.is_night(moment timestamptz DEFAULT now()) RETURNS boolean STABLE LANGUAGE sql AS $$
  SELECT CASE WHEN s.night_from <= s.night_to THEN t >= s.night_from AND t < s.night_to ELSE t >= s.night_from OR t < s.night_to END
  FROM queue.settings() s, LATERAL (SELECT (moment AT TIME ZONE s.time_zone)::time AS t) wall
$$;

-- a worker that winds down, or is outside its own hours, takes no work
CREATE FUNCTION queue.may_work(worker text, moment timestamptz DEFAULT now()) RETURNS boolean STABLE LANGUAGE sql AS $$
  SELECT coalesce((SELECT w.state IN ('active', 'silent') AND (w.works_from IS NULL
      OR CASE WHEN w.works_from <= w.works_to THEN t >= w.works_from AND t < w.works_to ELSE t >= w.works_from OR t < w.works_to END)
    FROM workers w, LATERAL (SELECT (moment AT TIME ZONE (queue.settings()).time_zone)::time AS t) wall WHERE w.id = worker), false)
$$;

-- Whose work starts next: start-time fair queueing (P. Goyal, H. M. Vin, H. Cheng, IEEE/ACM Trans. Netw. 5 (1997) 690).
-- A person's tag is max(own virtual time, the clock); the smallest tag goes first; one's virtual time then moves on by
-- estimate / weight, and is corrected when the chunk ends. The same rule orders one person's submissions of equal
-- priority. Inside the night window *tonight* goes before *now*, except on express slots.
CREATE FUNCTION queue.next_turn(express boolean, memory bigint, moment timestamptz DEFAULT now())
RETURNS TABLE (submission_id uuid, account_id uuid, person_tag float8, own_tag float8) STABLE LANGUAGE sql AS $$
  WITH circumstances AS MATERIALIZED (  -- once, not once for every submission
    SELECT s.max_slots, queue.is_night(moment) AS night, (SELECT c.virtual_time FROM turn_clock c) AS clock FROM queue.settings() s),
  startable AS (
    SELECT s.id, s.account_id, s.priority, s.created_at, greatest(s.virtual_time, t.clock) AS own_tag,
           greatest(t.virtual_time, c.clock) AS person_tag, t.running,
           CASE WHEN c.night AND NOT express AND NOT s.tonight THEN 1 ELSE 0 END AS rank
    FROM submissions s JOIN turns t ON t.account_id = s.account_id JOIN quota_balances b ON b.id = s.balance_id, circumstances c
    WHERE s.state = 'active' AND NOT isempty(s.todo)
      AND (c.night OR NOT s.tonight)
      AND s.memory_bytes <= memory
      AND (NOT express OR s.part_ms <= 10000)
      AND b.used_ms < b.granted_ms
      AND t.running < coalesce(t.max_slots, c.max_slots)),
  heads AS (
    SELECT DISTINCT ON (account_id) * FROM startable
    ORDER BY account_id, rank, priority DESC, own_tag, created_at, id)
  SELECT id, account_id, person_tag, own_tag FROM heads ORDER BY rank, person_tag, running, created_at, id LIMIT 1
$$;

-- what a worker does next with a chunk of this submission
CREATE FUNCTION queue.advice(submission uuid) RETURNS text STABLE LANGUAGE sql AS $$
  SELECT CASE WHEN s.state = 'cancelled' THEN 'cancel'
    WHEN s.state = 'paused' OR b.used_ms >= b.granted_ms THEN 'yield' ELSE 'go' END
  FROM submissions s JOIN quota_balances b ON b.id = s.balance_id WHERE s.id = submission
$$;
