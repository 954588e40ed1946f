import type { KernelManifest, ModelManifest } from '@nightcone/models';
import { readCustomSection } from './custom-section.ts';
import { KernelRefusal } from './types.ts';

export const MANIFEST_SECTION = 'nightcone.manifest';

/** The models and fields that a kernel was built with, from its custom section. */
export function readManifest(module: WebAssembly.Module): KernelManifest {
  const text = readCustomSection(module, MANIFEST_SECTION);
  if (text === undefined) throw new Error(`Not a kernel: the module has no section ${MANIFEST_SECTION}.`);
  const manifest = JSON.parse(text) as KernelManifest;
  if (manifest.interface !== 1) throw new Error(`Kernel interface ${manifest.interface} is not known here.`);
  return manifest;
}

/** Index and fields of a model in the manifest. */
export function modelOf(manifest: KernelManifest, id: string): { index: number; model: ModelManifest } {
  const index = manifest.models.findIndex((model) => model.id === id);
  const model = manifest.models[index];
  if (!model) throw new KernelRefusal('invalid-parameter', 2, `This kernel has no model '${id}'.`);
  return { index, model };
}
