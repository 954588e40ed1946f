/**
 * The whole public surface of the kernel, binary interface version 1 (README.md). A model is one `case` of
 * `selectModel`; its number is its position in the manifest and never changes.
 */
import { mark, release, releaseAll, reserve } from "./arena";
import { clearDiagnostic, diagnosticAddress, diagnosticLength as diagnosticBytes, fail } from "./diagnostic";
import { modelAssemble, modelAssembleCost, modelComputeSlice, modelOpen, modelSliceCost, modelSliceCount, use } from "./model";
import { openPayloads, outputAddress, outputBytes, setOutput } from "./payload";
import { INTERFACE_VERSION, openRecord, recordStatus } from "./record";
import { INVALID_RECORD, OK, OUT_OF_ORDER, PAYLOAD_MISMATCH } from "./status";
import * as continuumRibbon from "./models/continuum-ribbon";
import * as landauLevels from "./models/landau-levels";

function selectModel(index: i32): bool {
  switch (index) {
    case 0: return use(landauLevels.open, landauLevels.sliceCount, landauLevels.sliceCost, landauLevels.computeSlice, landauLevels.assemble, landauLevels.assembleCost);
    case 1: return use(continuumRibbon.open, continuumRibbon.sliceCount, continuumRibbon.sliceCost, continuumRibbon.computeSlice, continuumRibbon.assemble, continuumRibbon.assembleCost);
  }
  return false;
}

let isOpen: bool = false;
/** Everything reserved above this mark belongs to the running call. */
let afterOpen: usize = 0;

export function interfaceVersion(): u32 {
  return INTERFACE_VERSION;
}

/** Room for a record (no job open) or for the input of `assemble` (a job open). Releases what the last call left. */
export function allocate(bytes: u32): usize {
  if (isOpen) release(afterOpen);
  else releaseAll();
  return reserve(bytes);
}

/** Opens the record at `pointer`, which must come from `allocate`. */
export function open(pointer: usize, length: u32): i32 {
  clearDiagnostic();
  setOutput(0, 0);
  isOpen = false;
  if (!selectModel(openRecord(pointer, length))) {
    return fail(INVALID_RECORD, "Not a record of interface 1, or of a model that this kernel does not have.");
  }
  const status = modelOpen();
  const whole = recordStatus();
  if (whole != OK) return whole;
  if (status != OK) return status;
  isOpen = true;
  afterOpen = mark();
  return OK;
}

export function sliceCount(): i32 {
  return isOpen ? modelSliceCount() : 0;
}

/** Estimated floating-point operations of slice `index`. */
export function sliceCost(index: i32): f64 {
  return isOpen && index >= 0 && index < modelSliceCount() ? modelSliceCost(index) : 0;
}

export function computeSlice(index: i32): i32 {
  clearDiagnostic();
  setOutput(0, 0);
  if (!isOpen) return fail(OUT_OF_ORDER, "No job is open.");
  if (index < 0 || index >= modelSliceCount()) return fail(OUT_OF_ORDER, "There is no such slice.");
  release(afterOpen);
  return modelComputeSlice(index);
}

export function assembleCost(): f64 {
  return isOpen ? modelAssembleCost() : 0;
}

/** Takes the payloads of all slices in their order; needs `open` with the same record, not the same instance. */
export function assemble(pointer: usize, length: u32): i32 {
  clearDiagnostic();
  setOutput(0, 0);
  if (!isOpen) return fail(OUT_OF_ORDER, "No job is open.");
  if (!openPayloads(pointer, length, modelSliceCount())) {
    return fail(PAYLOAD_MISMATCH, "The payloads are not those of this job's slices.");
  }
  return modelAssemble();
}

export function resultPointer(): usize {
  return outputAddress();
}
export function resultLength(): usize {
  return outputBytes();
}
export function diagnosticPointer(): usize {
  return diagnosticAddress();
}
export function diagnosticLength(): usize {
  return diagnosticBytes();
}

export function close(): void {
  isOpen = false;
  releaseAll();
  setOutput(0, 0);
  clearDiagnostic();
}
