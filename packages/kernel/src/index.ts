/** Host side of the kernel; runs in Node.js, in worker threads and in browsers alike. */
export { addCustomSection } from './custom-section.ts';
export { encodeSpecification } from './encode-specification.ts';
export { MANIFEST_SECTION, readManifest } from './manifest.ts';
export { type OpenKernelOptions, openKernel } from './open-kernel.ts';
export { type StatusName, statusNames } from './status-names.ts';
export * from './types.ts';
