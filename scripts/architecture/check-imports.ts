import { builtinModules } from 'node:module';
import path from 'node:path';
import { parseSync } from 'vite';
import { findCycles } from './find-cycles.ts';
import type { ImportRule } from './import-rules.ts';

/** Name, folder and export targets of one workspace package. */
export interface WorkspacePackage {
  name: string;
  folder: string;
  exports: Record<string, string | { types?: string; default?: string }>;
}

/** Every module that a file names in an import, an export … from, an import() or an import type. */
export function importedModules(file: string, text: string): { modules: string[]; error?: string } {
  const parsed = parseSync(file, text);
  const found = new Set<string>();
  for (const entry of parsed.module.staticImports) found.add(entry.moduleRequest.value);
  for (const entry of parsed.module.staticExports) {
    for (const name of entry.entries) if (name.moduleRequest) found.add(name.moduleRequest.value);
  }
  // import('x') stands in no list when it is a type: take it from the text
  for (const match of text.matchAll(/\bimport\(\s*(['"])([^'"]+)\1\s*\)/g)) found.add(match[2] as string);
  return { modules: [...found], error: parsed.errors[0]?.message };
}

function resolveModule(
  from: string,
  module: string,
  files: ReadonlySet<string>,
  packages: ReadonlyMap<string, WorkspacePackage>,
): string | undefined {
  if (module.startsWith('.')) {
    const base = path.posix.join(path.posix.dirname(from), module.replace(/\?.*$/, ''));
    return (
      [base, `${base}.ts`, `${base}.tsx`, `${base}/index.ts`].find((file) => files.has(file)) ??
      (/\.(css|json|mjs|wasm)$/.test(base) ? base : undefined)
    );
  }
  if (module.startsWith('node:') || builtinModules.includes(module)) return `node:${module.replace(/^node:/, '')}`;
  const name = module
    .split('/')
    .slice(0, module.startsWith('@') ? 2 : 1)
    .join('/');
  const own = packages.get(name);
  if (!own) return `npm:${name}`;
  const target = own.exports[`.${module.slice(name.length)}`];
  const file = typeof target === 'string' ? target : (target?.types ?? target?.default);
  return file === undefined ? undefined : path.posix.join(own.folder, file);
}

/** Problems of a set of files (path → text), in the order of the files; empty when every rule holds. */
export function checkImports(
  files: ReadonlyMap<string, string>,
  packages: readonly WorkspacePackage[],
  rules: readonly ImportRule[],
): string[] {
  const names = new Set(files.keys());
  const byName = new Map(packages.map((entry) => [entry.name, entry]));
  const graph = new Map<string, string[]>();
  const problems: string[] = [];
  for (const [file, text] of files) {
    const { modules, error } = importedModules(file, text);
    if (error) problems.push(`does-not-parse: ${file}: ${error}`);
    const edges: string[] = [];
    for (const module of modules) {
      const to = resolveModule(file, module, names, byName);
      if (to === undefined) {
        problems.push(`unresolved: ${file} → ${module}`);
        continue;
      }
      if (names.has(to)) edges.push(to);
      for (const rule of rules) {
        const match = rule.from.exec(file);
        if (match && rule.forbids(to, match)) problems.push(`${rule.name}: ${file} → ${to}`);
      }
    }
    graph.set(file, edges);
  }
  for (const cycle of findCycles(graph)) problems.push(`no-cycles: ${cycle.join(' ↔ ')}`);
  return problems;
}
