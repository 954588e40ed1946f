/**
 * A slice: a block of wave numbers of one valley and spin. Its payload is a sequence of doubles:
 *
 *   rows, one per wave number (row.ts)
 *   number of extrema, then the extrema (extrema.ts) between the rows and towards the next block's first row
 *   number of outside counts (0, 1 or 2 × energies), then signed level counts at every energy half an axis beyond the
 *   left and/or right end: the first and the last block look whether a level crosses the energy out there
 *   the checks (checks.ts)
 */
import { mark, release, reserve } from "../../arena";
import { fail } from "../../diagnostic";
import { at, put } from "../../doubles";
import { progress } from "../../host";
import { setOutput } from "../../payload";
import { NOT_CONVERGED, OK } from "../../status";
import { chainCounts } from "../../solvers/chain";
import { intAt } from "../../solvers/chain-brackets";
import { CHECK_DOUBLES, checkPoint, newChecks } from "./checks";
import { blockCount, blockEnd, blockStart } from "./blocks";
import { EXTREMUM_DOUBLES, extremaCount, extremaStatus, findExtrema } from "./extrema";
import { fillChain } from "./grid";
import { energyAxis, kAxis, kIncreases, spinCount, spinShift, stateCount, states } from "./parameters";
import { Point } from "./point";
import { solvePoint } from "./request";
import { finest, finestChain, newSetting, Setting } from "./setting";
import { keepRow, packRow, rowDoubles } from "./row";

let cursor: usize = 0;

/** Moves `bytes` from anywhere above down to the end of the payload. */
function append(from: usize, bytes: usize): void {
  memory.copy(cursor, from, bytes);
  cursor += bytes;
}

function isState(k: i32): bool {
  for (let i = 0; i < stateCount; i++) if (<i32>at(states, i) == k) return true;
  return false;
}

export function computeSlice(slice: i32): i32 {
  const blocks = blockCount();
  const block = slice % blocks;
  const spin = (slice / blocks) % spinCount;
  const valleyRow = slice / (blocks * spinCount);
  const setting = newSetting(valleyRow, spin);
  const checks = newChecks();
  const start = blockStart(block);
  const end = blockEnd(block);
  const ordered = kIncreases();
  const neighbour = ordered && block + 1 < blocks ? 1 : 0;
  const total = end - start + neighbour;
  const rows = reserve(<u64>total * 4);
  for (let i = 0; i < total; i++) {
    progress(<f64>i, <f64>total + 1);
    const room = mark();
    const point = changetype<Point>(reserve(offsetof<Point>()));
    const status = solvePoint(setting, point, kAxis.at(start + i));
    if (status != OK) return status;
    if (i < end - start) checkPoint(checks, setting, point, spinShift(spin), i == 0);
    const row = packRow(setting, point, i < end - start && isState(start + i));
    store<u32>(rows + (<usize>i << 2), <u32>keepRow(row, room));
  }
  const extremaRoom = reserve(8);
  put(extremaRoom, 0, 0);
  let extremaEnd = extremaRoom + 8;
  if (ordered) {
    for (let i = 0; i + 1 < total; i++) {
      progress(<f64>total + <f64>i / <f64>total, <f64>total + 1);
      const room = mark();
      const found = findExtrema(setting, load<u32>(rows + (<usize>i << 2)), load<u32>(rows + (<usize>(i + 1) << 2)));
      if (extremaStatus != OK) return extremaStatus;
      const bytes = <usize>(extremaCount * EXTREMUM_DOUBLES) << 3;
      release(room);
      if (bytes > 0) {
        reserve(<u64>bytes + 64);
        memory.copy(extremaEnd, found, bytes);
        extremaEnd += bytes;
        put(extremaRoom, 0, at(extremaRoom, 0) + <f64>extremaCount);
      }
    }
  }
  const outside = reserve((2 * <u64>energyAxis.count + 1) << 3);
  put(outside, 0, 0);
  if (ordered && block == 0 && !countOutside(setting, outside, -1)) return fail(NOT_CONVERGED, "Counting beyond the axis failed.");
  if (ordered && block + 1 == blocks && !countOutside(setting, outside, 1)) return fail(NOT_CONVERGED, "Counting beyond the axis failed.");
  const payload = <usize>load<u32>(rows);
  cursor = payload;
  for (let i = 0; i < end - start; i++) {
    const row = <usize>load<u32>(rows + (<usize>i << 2));
    append(row, <usize>rowDoubles(row) << 3);
  }
  append(extremaRoom, extremaEnd - extremaRoom);
  append(outside, (1 + <usize>at(outside, 0)) << 3);
  append(checks, <usize>CHECK_DOUBLES << 3);
  setOutput(payload, cursor - payload);
  return OK;
}

const shifts: usize = memory.data(64, 16);
const counts: usize = memory.data(32, 16);

/** Signed counts at every energy half an axis length beyond one end, on the finest grid; appended to `outside`. */
function countOutside(setting: Setting, outside: usize, side: f64): bool {
  const first = kAxis.at(0);
  const last = kAxis.at(kAxis.count - 1);
  const k = side < 0 ? first - 0.5 * (last - first) : last + 0.5 * (last - first);
  const chain = finestChain(setting);
  fillChain(chain, finest(setting), setting.valley, k);
  const n = energyAxis.count;
  const used = <i32>at(outside, 0);
  for (let from = 0; from < n; from += 8) {
    for (let i = 0; i < 8; i++) put(shifts, i, energyAxis.at(min(from + i, n - 1)));
    if (!chainCounts(chain, shifts, counts)) return false;
    for (let i = 0; i < 8 && from + i < n; i++) put(outside, 1 + used + from + i, <f64>(intAt(counts, i) - finest(setting).half));
  }
  put(outside, 0, <f64>(used + n));
  return true;
}
