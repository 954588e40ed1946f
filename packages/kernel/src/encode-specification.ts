import type { Field, FieldType, Json, KernelManifest } from '@nightcone/models';
import { modelOf } from './manifest.ts';
import { KernelRefusal, type Tables } from './types.ts';

export const RECORD_MAGIC = 0x3152434e; // "NCR1", little-endian
const HEADER_BYTES = 16;

interface Body {
  model: string;
  parameters: object;
  numerics: object;
}

/**
 * Writes the record of a specification: a header, then every field depth-first in the manifest's order as doubles
 * (README.md, "Record"). It knows no model: names, kinds and order all come from the manifest. The specification must
 * be complete (defaults written out); whatever is missing or of another shape is refused with its pointer.
 */
export function encodeSpecification(manifest: KernelManifest, body: Body, tables?: Tables): Uint8Array<ArrayBuffer> {
  const { index, model } = modelOf(manifest, body.model);
  const writer = new RecordWriter(tables ?? new Map());
  writer.members(model.parameters, body.parameters as Json, '/parameters');
  writer.members(model.numerics, body.numerics as Json, '/numerics');
  const bytes = new Uint8Array(HEADER_BYTES + 8 * writer.values.length);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, RECORD_MAGIC, true);
  view.setUint32(4, manifest.interface, true);
  view.setUint32(8, index, true);
  for (const [i, value] of writer.values.entries()) view.setFloat64(HEADER_BYTES + 8 * i, value, true);
  return bytes;
}

function refuse(pointer: string, message: string): never {
  throw new KernelRefusal('invalid-parameter', 2, `${pointer}: ${message}`);
}

function asObject(value: Json | undefined, pointer: string): { [key: string]: Json } {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) refuse(pointer, 'an object is expected.');
  return value;
}

class RecordWriter {
  readonly values: number[] = [];

  constructor(private readonly tables: Tables) {}

  members(fields: readonly Field[], value: Json | undefined, pointer: string): void {
    const object = asObject(value, pointer);
    for (const field of fields) this.value(field, object[field.name], `${pointer}/${field.name}`);
  }

  private number(value: Json | undefined, pointer: string): void {
    if (typeof value !== 'number' || !Number.isFinite(value)) refuse(pointer, 'a finite number is expected.');
    this.values.push(value === 0 ? 0 : value); // −0 is 0
  }

  private integer(value: Json | undefined, pointer: string): void {
    if (!Number.isSafeInteger(value)) refuse(pointer, 'an integer is expected.');
    this.number(value, pointer);
  }

  private oneOf(values: readonly string[], value: Json | undefined, pointer: string): number {
    const index = typeof value === 'string' ? values.indexOf(value) : -1;
    if (index < 0) refuse(pointer, `one of ${values.join(', ')} is expected.`);
    this.values.push(index);
    return index;
  }

  private value(type: FieldType, value: Json | undefined, pointer: string): void {
    switch (type.type) {
      case 'number':
        this.number(value, pointer);
        break;
      case 'integer':
        this.integer(value, pointer);
        break;
      case 'boolean':
        if (typeof value !== 'boolean') refuse(pointer, 'true or false is expected.');
        this.values.push(value ? 1 : 0);
        break;
      case 'enum':
        this.oneOf(type.values, value, pointer);
        break;
      case 'choice': {
        const object = asObject(value, pointer);
        const names = type.kinds.map((kind) => kind.kind);
        const index = this.oneOf(names, object.kind, `${pointer}/kind`);
        this.members(type.kinds[index]?.members ?? [], object, pointer);
        break;
      }
      case 'group':
        this.members(type.members, value, pointer);
        break;
      case 'axis':
        this.axis(value, pointer);
        break;
      case 'auto-number':
        if (typeof value !== 'number') {
          this.oneOf(['auto'], asObject(value, pointer).kind, `${pointer}/kind`);
        } else {
          this.values.push(1);
          this.number(value, pointer);
        }
        break;
      case 'list':
        if (!Array.isArray(value)) refuse(pointer, 'a list is expected.');
        this.values.push(value.length);
        value.forEach((item, i) => {
          this.value(type.items, item, `${pointer}/${i}`);
        });
        break;
      case 'table':
        this.table(type.columns.length, value, pointer);
        break;
    }
  }

  private axis(value: Json | undefined, pointer: string): void {
    if (typeof value === 'number') {
      this.values.push(0);
      this.number(value, pointer);
      return;
    }
    const axis = asObject(value, pointer);
    const kind = this.oneOf(['number', 'range', 'values', 'whole-zone'], axis.kind, `${pointer}/kind`);
    if (kind === 1) {
      this.number(axis.start, `${pointer}/start`);
      this.number(axis.stop, `${pointer}/stop`);
      this.integer(axis.count, `${pointer}/count`);
    } else if (kind === 2) {
      if (!Array.isArray(axis.values)) refuse(`${pointer}/values`, 'a list is expected.');
      this.values.push(axis.values.length);
      axis.values.forEach((item, i) => {
        this.number(item, `${pointer}/values/${i}`);
      });
    } else if (kind === 3) {
      this.integer(axis.count, `${pointer}/count`);
    } else {
      refuse(pointer, 'a bare number has no kind.');
    }
  }

  private table(columnCount: number, digest: Json | undefined, pointer: string): void {
    const table = typeof digest === 'string' ? this.tables.get(digest) : undefined;
    if (!table) refuse(pointer, 'the table it names was not given.');
    if (table.columns.length < columnCount) refuse(pointer, `${columnCount} columns are expected.`);
    const rows = table.columns[0]?.values.length ?? 0;
    this.values.push(table.columns.length, rows);
    for (const column of table.columns) {
      if (column.values.length !== rows) refuse(pointer, 'its columns have different lengths.');
      for (const value of column.values) this.number(value, pointer);
    }
  }
}
