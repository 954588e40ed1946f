/**
 * Model `landau-levels`: Landau ladders of one- and two-layer cones, what they hold, and their plateaus.
 *
 * A slice is a block of FIELDS_PER_SLICE values of the field axis; its payload is one row of doubles per field (row.ts).
 * Methods: monolayer*.ts, bilayer*.ts, chosen per job by field-levels.ts; checks.ts compares them.
 */
import { fits, reserve } from "../arena";
import { fail } from "../diagnostic";
import { at } from "../doubles";
import { progress } from "../host";
import { payloadAddress, payloadBytes, reservePayload } from "../payload";
import { addCertificateNumber, beginResult, finishResult } from "../result";
import { MEMORY_EXCEEDED, NOT_CONVERGED, OK, PAYLOAD_MISMATCH } from "../status";
import { ARRAY_COUNT, writeArrays } from "./landau-levels/arrays";
import { addChecks } from "./landau-levels/checks";
import { assemblyCost, rowCost } from "./landau-levels/cost";
import { prepareLineShape } from "./landau-levels/line-shape";
import { hasLevels } from "./landau-levels/monolayer";
import { field, isBilayer, levelCount, readParameters, valleyCount } from "./landau-levels/parameters";
import { errorsOffset, fillRow, layOutRow, rowLength, validOffset, wholeOffset } from "./landau-levels/row";

const FIELDS_PER_SLICE: i32 = 16;

export function open(): i32 {
  const status = readParameters();
  if (status != OK) return status;
  layOutRow();
  prepareLineShape();
  // rows and arrays each hold the result once
  if (!fits(3 * ((<u64>rowLength * <u64>field.count) << 3))) {
    return fail(MEMORY_EXCEEDED, "The result does not fit into 4 GiB: ask for fewer fields, energies or carrier densities.");
  }
  return OK;
}

export function sliceCount(): i32 {
  return (field.count + FIELDS_PER_SLICE - 1) / FIELDS_PER_SLICE;
}

function fieldsIn(slice: i32): i32 {
  return min(FIELDS_PER_SLICE, field.count - slice * FIELDS_PER_SLICE);
}

export function sliceCost(slice: i32): f64 {
  return rowCost() * <f64>fieldsIn(slice);
}

export function computeSlice(slice: i32): i32 {
  const count = fieldsIn(slice);
  const bytes = <usize>rowLength << 3;
  const rows = reservePayload(<u64>count * bytes);
  for (let i = 0; i < count; i++) {
    progress(<f64>i, <f64>count);
    fillRow(rows + <usize>i * bytes, field.at(slice * FIELDS_PER_SLICE + i));
  }
  return OK;
}

export function assembleCost(): f64 {
  return assemblyCost(field.count);
}

export function assemble(): i32 {
  const bytes = <usize>rowLength << 3;
  const rows = reserve(<u64>field.count * 4);
  for (let slice = 0, i = 0; slice < sliceCount(); slice++) {
    const count = fieldsIn(slice);
    if (payloadBytes(slice) != <usize>count * bytes) return fail(PAYLOAD_MISMATCH, "A payload has another length than its slice.");
    for (let j = 0; j < count; j++, i++) store<u32>(rows + (<usize>i << 2), <u32>(payloadAddress(slice) + <usize>j * bytes));
  }
  beginResult(ARRAY_COUNT);
  writeArrays(rows);
  const status = addCertificate(rows);
  return status == OK ? finishResult() : status;
}

/** Levels wanted and found, the largest error of a valid level, and the checks in the largest and smallest field. */
function addCertificate(rows: usize): i32 {
  const perField = valleyCount * levelCount();
  let wanted = 0;
  let found = 0;
  let largest = 0.0;
  let high = -1;
  let low = -1;
  for (let i = 0; i < field.count; i++) {
    const row = <usize>load<u32>(rows + (<usize>i << 2));
    const b = field.at(i);
    if (isBilayer ? b != 0 : hasLevels(b)) wanted += perField;
    for (let j = 0; j < perField; j++) {
      if (at(row, validOffset + j) == 0) continue;
      found++;
      largest = Math.max(largest, at(row, errorsOffset + j));
    }
    if (at(row, wholeOffset) == 0) continue;
    if (high < 0 || Math.abs(b) > Math.abs(field.at(high))) high = i;
    if (low < 0 || Math.abs(b) < Math.abs(field.at(low))) low = i;
  }
  if (wanted > 0 && found == 0) {
    return fail(NOT_CONVERGED, "No level converged in any field: take a longer ladder, a finer grid or higher fields.");
  }
  addCertificateNumber(<f64>wanted);
  addCertificateNumber(<f64>found);
  addCertificateNumber(largest);
  if (high >= 0) {
    addChecks(load<u32>(rows + (<usize>high << 2)), field.at(high), load<u32>(rows + (<usize>low << 2)), field.at(low));
  }
  return OK;
}
