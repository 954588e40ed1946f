// Node.js cannot load TypeScript in a worker by itself: this file opens the door for slice-thread.ts.
import { tsImport } from 'tsx/esm/api';

await tsImport('./slice-thread.ts', import.meta.url);
