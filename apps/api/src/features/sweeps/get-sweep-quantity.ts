import type { ArrayInfo, endpoints } from '@nightcone/contracts';
import { type Db, findOptionalKernel, findOptionalSweep, listPointArrays, readArraySlices } from '@nightcone/db';
import type { KernelManifest, ResultArray, Specification } from '@nightcone/models';
import { arrayValues } from '@nightcone/provenance';
import type { Handler } from '../../context.ts';
import { notFound, Refusal } from '../../refusal.ts';

/** More numbers than this are no plot any more. */
const mostNumbers = 1_000_000;
const bytesOf = { f64: 8, i32: 4, u8: 1 } as const;

/** Numbers of one array, or of one row of it, for every point that has a result. */
export const getSweepQuantity: Handler<typeof endpoints.getSweepQuantity> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const { array: name, row } = input.query;
  const sweep = await findOptionalSweep(db, input.params.id, ctx.caller.account.id);
  if (!sweep) throw notFound('sweep');
  const known = await findResultArray(db, sweep.definition.specification as Specification, name);
  if (!known) throw badQuery('array', `The results of this sweep have no array ${name}.`, name);
  const points = (await listPointArrays(db, sweep.submissionId, name)).flatMap(({ place, arrays }) => {
    const infos = (arrays ?? []) as ArrayInfo[];
    const info = infos.find((candidate) => candidate.name === name);
    return info ? [{ place, info, offsets: infos.find((candidate) => candidate.name === info.ragged) }] : [];
  });
  const extents = known.ragged ? await raggedExtents(db, points, row) : plainExtents(points, row);
  const numbers = extents.reduce((sum, extent) => sum + extent.count, 0);
  if (numbers > mostNumbers)
    throw badQuery('row', `These are ${numbers.toLocaleString('en')} numbers; name one row of the array.`, row ?? null);
  const bytes = await readArraySlices(
    db,
    extents.map(({ info, from, count }) => {
      const size = bytesOf[info.dtype];
      return { sha256: info.sha256, from: from * size, length: count * size };
    }),
  );
  const rows = extents.map(({ place, info }, i) => ({
    index: place,
    values: [...arrayValues({ dtype: info.dtype, bytes: new Uint8Array(bytes[i] ?? []) })],
  }));
  return { array: name, unit: known.unit, rows };
};

interface PointArray {
  place: number;
  info: ArrayInfo;
  offsets?: ArrayInfo;
}
interface Extent extends PointArray {
  /** In elements of the array. */
  from: number;
  count: number;
}

const elements = (shape: readonly number[]) => shape.reduce((product, length) => product * length, 1);

/** A row is one index of the first dimension. */
function plainExtents(points: readonly PointArray[], row: number | undefined): Extent[] {
  return points.flatMap((point) => {
    const { shape } = point.info;
    if (row === undefined) return [{ ...point, from: 0, count: elements(shape) }];
    const width = elements(shape.slice(1));
    return row < (shape[0] ?? 1) ? [{ ...point, from: row * width, count: width }] : [];
  });
}

/** A row is what lies between two neighbouring offsets. */
async function raggedExtents(db: Db, points: readonly PointArray[], row: number | undefined): Promise<Extent[]> {
  if (row === undefined) return points.map((point) => ({ ...point, from: 0, count: elements(point.info.shape) }));
  const within = points.filter(({ offsets }) => offsets !== undefined && row + 1 < elements(offsets.shape));
  const pairs = await readArraySlices(
    db,
    within.map(({ offsets }) => ({ sha256: offsets?.sha256 ?? '', from: row * 4, length: 8 })),
  );
  return within.flatMap((point, i) => {
    const pair = pairs[i];
    if (!pair || pair.length < 8) return [];
    const from = pair.readInt32LE(0);
    return [{ ...point, from, count: pair.readInt32LE(4) - from }];
  });
}

async function findResultArray(
  db: Db,
  { kernel, model }: Specification,
  name: string,
): Promise<ResultArray | undefined> {
  const manifest = (await findOptionalKernel(db, kernel))?.manifest as KernelManifest | undefined;
  return manifest?.models.find(({ id }) => id === model)?.results.find((array) => array.name === name);
}

const badQuery = (field: string, message: string, value: unknown) =>
  new Refusal('invalid-input', message, { errors: [{ field, message, value }] });
