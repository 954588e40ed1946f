/**
 * The type language in which every model describes its inputs. One tree serves the zod schema, the form, the kernel's
 * record, the methods page and the OpenAPI description; nothing restates it by hand.
 *
 * `display` is for people and is left out of the kernel's manifest: a mended sentence must not change a digest.
 */

/** What people read about a field. `symbol` is TeX. */
export interface Display {
  symbol?: string;
  title: string;
  help: string;
  /** Section of the form. */
  group?: 'material' | 'geometry' | 'fields' | 'numerics' | 'request';
}

export type Json = null | boolean | number | string | Json[] | { [key: string]: Json };

export interface NumberType {
  type: 'number';
  /** Unit of the stored value ('' when dimensionless), e.g. 'eV', 'nm', '1/nm', 'T'. */
  unit: string;
  min: number;
  max: number;
  /** The value `min` itself is refused (lengths, velocities). */
  exclusiveMin?: boolean;
}
export interface IntegerType {
  type: 'integer';
  min: number;
  max: number;
}
export interface BooleanType {
  type: 'boolean';
}
/** ASCII values; new ones are appended, never reordered: the index is what the kernel reads. */
export interface EnumType {
  type: 'enum';
  values: string[];
}
/** `{ "kind": "<ascii-kebab>", …members }`, always present; new kinds are appended. */
export interface ChoiceType {
  type: 'choice';
  kinds: { kind: string; members: Field[]; display?: Pick<Display, 'title' | 'help'> }[];
}
/**
 * A bare number, `{kind:'range',start,stop,count}`, `{kind:'values',values}` or (where `wholeZone`)
 * `{kind:'whole-zone',count}`. Kind indices in the record: 0 bare number, 1 range, 2 values, 3 whole-zone.
 */
export interface AxisType {
  type: 'axis';
  unit: string;
  min: number;
  max: number;
  maxCount: number;
  wholeZone?: boolean;
}
/** A bare number or `{kind:'auto'}`, which the kernel resolves and returns as an array. Record: 0 auto, 1 number. */
export interface AutoNumberType {
  type: 'auto-number';
  unit: string;
  min: number;
  max: number;
}
/** An object with fixed members and no kind. */
export interface GroupType {
  type: 'group';
  members: Field[];
}
export interface ListType {
  type: 'list';
  items: FieldType;
  minItems: number;
  maxItems: number;
}
/** A table digest (64 hex digits); the kernel reads the table's columns in place. */
export interface TableType {
  type: 'table';
  columns: { role: string; unit: string }[];
}

export type FieldType =
  | NumberType
  | IntegerType
  | BooleanType
  | EnumType
  | ChoiceType
  | AxisType
  | AutoNumberType
  | GroupType
  | ListType
  | TableType;

export type Field = FieldType & {
  /** Carries its unit, e.g. `fieldT`. */
  name: string;
  /** Literal, written out in every specification. Groups take the defaults of their members. */
  default?: Json;
  display?: Display;
};

/** Value of an axis field in a specification. */
export type AxisValue =
  | number
  | { kind: 'range'; start: number; stop: number; count: number }
  | { kind: 'values'; values: number[] }
  | { kind: 'whole-zone'; count: number };
