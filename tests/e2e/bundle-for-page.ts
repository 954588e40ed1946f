import { fileURLToPath } from 'node:url';
import { build, type Rolldown } from 'vite';

/** One script that makes the exports of a file of this folder the global `name` of a page. */
export async function bundleForPage(file: string, name: string): Promise<string> {
  const output = (await build({
    configFile: false,
    logLevel: 'error',
    build: {
      write: false,
      target: 'es2022',
      lib: { entry: fileURLToPath(new URL(file, import.meta.url)), formats: ['iife'], name },
    },
  })) as Rolldown.RolldownOutput[];
  return output[0]?.output[0].code ?? '';
}
