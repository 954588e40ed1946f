import { compileKernel } from '../src/build/compile-kernel.ts';

/** Run as a child from another folder: prints the digest of a fresh compilation. */
console.log((await compileKernel()).digest);
