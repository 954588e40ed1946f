import type { KernelManifest, ModelManifest } from '@nightcone/models';
import { decodeResult } from './decode-result.ts';
import { encodeSpecification } from './encode-specification.ts';
import { modelOf, readManifest } from './manifest.ts';
import { packedLength, packPayloads } from './pack-payloads.ts';
import { statusName } from './status-names.ts';
import { KernelCrash, type KernelInstance, KernelRefusal, type KernelResult, type Tables } from './types.ts';

/** Exports of binary interface version 1. Pointers and lengths are u32: `>>> 0` on this side. */
interface KernelExports {
  memory: WebAssembly.Memory;
  allocate(bytes: number): number;
  open(pointer: number, length: number): number;
  sliceCount(): number;
  sliceCost(index: number): number;
  computeSlice(index: number): number;
  assembleCost(): number;
  assemble(pointer: number, length: number): number;
  resultPointer(): number;
  resultLength(): number;
  diagnosticPointer(): number;
  diagnosticLength(): number;
  close(): void;
}

export interface OpenKernelOptions {
  /** Called from inside a running slice or `assemble`. What it throws leaves the call unchanged: that is how one cancels. */
  onProgress?: (done: number, total: number) => void;
}

/** One instance of a kernel: its own memory, one job open at a time. Instantiates synchronously. */
export function openKernel(module: WebAssembly.Module, options: OpenKernelOptions = {}): KernelInstance {
  return new OpenKernel(module, options);
}

class OpenKernel implements KernelInstance {
  readonly manifest: KernelManifest;
  private readonly kernel: KernelExports;
  private model: ModelManifest | undefined;

  constructor(module: WebAssembly.Module, { onProgress }: OpenKernelOptions) {
    this.manifest = readManifest(module);
    const instance = new WebAssembly.Instance(module, {
      host: {
        progress: (done: number, total: number) => onProgress?.(done, total),
        abort: (code: number) => {
          if (code < 0) throw new KernelCrash('This machine has no memory left for the kernel.');
          throw this.refusal(code);
        },
      },
    });
    this.kernel = instance.exports as unknown as KernelExports;
  }

  open(specification: { model: string; parameters: object; numerics: object }, tables?: Tables): void {
    this.close();
    const record = encodeSpecification(this.manifest, specification, tables);
    const { model } = modelOf(this.manifest, specification.model);
    this.call(() => {
      const pointer = this.kernel.allocate(record.length) >>> 0;
      new Uint8Array(this.kernel.memory.buffer, pointer, record.length).set(record);
      this.check(this.kernel.open(pointer, record.length));
    });
    this.model = model;
  }

  sliceCount(): number {
    this.openModel();
    return this.kernel.sliceCount();
  }

  sliceCost(index: number): number {
    this.openModel();
    return this.kernel.sliceCost(index);
  }

  assembleCost(): number {
    this.openModel();
    return this.kernel.assembleCost();
  }

  computeSlice(index: number): Uint8Array {
    this.openModel();
    return this.call(() => {
      this.check(this.kernel.computeSlice(index));
      return this.output().slice();
    });
  }

  assemble(payloads: readonly Uint8Array[]): KernelResult {
    const model = this.openModel();
    return this.call(() => {
      const length = packedLength(payloads);
      if (length > 0xffff0000) throw new KernelRefusal('memory-exceeded', 4, 'The payloads exceed 4 GiB.');
      const pointer = this.kernel.allocate(length) >>> 0;
      packPayloads(payloads, this.kernel.memory.buffer, pointer);
      this.check(this.kernel.assemble(pointer, length));
      return decodeResult(model, this.output());
    });
  }

  close(): void {
    this.model = undefined;
    this.kernel.close();
  }

  private openModel(): ModelManifest {
    if (!this.model) throw new KernelRefusal('out-of-order', 10, 'No job is open.');
    return this.model;
  }

  /** A view of what the last call left, made anew: growing the memory detaches older views. */
  private output(): Uint8Array {
    return new Uint8Array(
      this.kernel.memory.buffer,
      this.kernel.resultPointer() >>> 0,
      this.kernel.resultLength() >>> 0,
    );
  }

  private check(status: number): void {
    if (status !== 0) throw this.refusal(status);
  }

  private refusal(code: number): KernelRefusal {
    const text = new TextDecoder().decode(
      new Uint8Array(
        this.kernel.memory.buffer,
        this.kernel.diagnosticPointer() >>> 0,
        this.kernel.diagnosticLength() >>> 0,
      ),
    );
    const name = statusName(code);
    return new KernelRefusal(name, code, text || `The kernel refused: ${name}.`);
  }

  /** A trap or a failed allocation of the machine becomes KernelCrash; everything else passes unchanged. */
  private call<T>(work: () => T): T {
    try {
      return work();
    } catch (error) {
      if (error instanceof WebAssembly.RuntimeError || error instanceof RangeError) {
        throw new KernelCrash(`The kernel's machine failed: ${error.message}`, { cause: error });
      }
      throw error;
    }
  }
}
