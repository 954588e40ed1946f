// Plain JavaScript, since Node cannot start a TypeScript file as a worker thread: loads the real entry through tsx.
import { tsImport } from 'tsx/esm/api';

await tsImport('./plan-thread.ts', import.meta.url);
