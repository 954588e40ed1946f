import type { endpoints } from '@nightcone/contracts';
import { findOptionalJob, readArray } from '@nightcone/db';
import { findModel, type Specification, validityOf } from '@nightcone/models';
import { csvChunks, jsonChunks, npzChunks, type ResultRecord } from '@nightcone/provenance';
import { breathing } from '../../breathing.ts';
import type { Download, Handler } from '../../context.ts';
import { notFound, Refusal } from '../../refusal.ts';

const types = { json: 'application/json', csv: 'text/csv; charset=utf-8', npz: 'application/zip' };
const chunksOf: Record<keyof typeof types, (record: ResultRecord) => Iterable<string | Uint8Array>> = {
  json: jsonChunks,
  csv: csvChunks,
  npz: npzChunks,
};

/** The result as a file, written in pieces; the same job gives the same bytes. */
export const exportJob: Handler<typeof endpoints.exportJob> = async ({ ctx, input }): Promise<Download> => {
  const { db } = ctx.services;
  const { hash } = input.params;
  const { format } = input.query;
  const job = await findOptionalJob(db, hash, ctx.caller.account.id);
  if (!job) throw notFound('job');
  const { resultDigest, arrays, certificate } = job;
  if (!resultDigest || !arrays || !certificate)
    throw new Refusal('conflict', `This job is ${job.state}; it has no result to export yet.`);
  const specification = job.specification as Specification;
  const definition = findModel(job.model);
  const record: ResultRecord = {
    specification,
    jobHash: hash,
    resultDigest,
    result: {
      arrays: await Promise.all(
        arrays.map(async ({ sha256, bytes: _, ...array }) => ({ ...array, bytes: await aligned(db, sha256) })),
      ),
      certificate,
    },
    notes: definition ? validityOf(definition, specification) : [],
  };
  return {
    type: types[format],
    fileName: `${job.model}-${hash.slice(0, 12)}.${format}`,
    chunks: breathing(chunksOf[format](record)),
  };
};

/** Typed arrays need their bytes at a multiple of eight; the driver's buffers lie anywhere. */
const aligned = async (db: Parameters<typeof readArray>[0], sha256: string) =>
  new Uint8Array(await readArray(db, sha256));
