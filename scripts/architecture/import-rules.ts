/** Who may import whom, by pattern: a new file is under the rules without anybody adding it to a list. */

export interface ImportRule {
  name: string;
  from: RegExp;
  /** `to` is a path of the repository, `npm:name` or `node:name`; `match` is the match of `from`. */
  forbids: (to: string, match: RegExpExecArray) => boolean;
}

const ours = /^(?:packages|apps)\/([^/]+)\//;

/** Packages of ours that each package may import, beside itself. */
export const mayImport: Record<string, readonly string[]> = {
  models: [],
  contracts: ['models'],
  kernel: ['models'],
  provenance: ['kernel'],
  drawing: ['contracts'],
  db: ['contracts'],
  api: ['contracts', 'models', 'kernel', 'provenance', 'drawing', 'db'],
  worker: ['contracts', 'models', 'kernel', 'provenance', 'drawing', 'db'],
  web: ['contracts', 'models', 'kernel', 'provenance', 'drawing'],
  cli: ['contracts', 'models', 'kernel', 'provenance', 'drawing'],
};

/** Tests may reach across packages; what ships may not. */
const shipped = (folder: string) => new RegExp(`^${folder}(?!.*\\.test\\.tsx?$)`);

export const importRules: ImportRule[] = [
  {
    name: 'packages-import-downwards',
    from: shipped('(?:packages|apps)/([^/]+)/src/'),
    forbids: (to, match) => {
      const target = ours.exec(to)?.[1];
      const own = match[1] as string;
      return target !== undefined && target !== own && !(mayImport[own] ?? []).includes(target);
    },
  },
  {
    name: 'shared-packages-run-in-browsers',
    from: shipped('packages/(?:contracts|models|provenance|drawing|kernel)/src/(?!node|build/|golden/|testing/)'),
    forbids: (to) => to.startsWith('node:'),
  },
  {
    name: 'web-runs-in-browsers',
    from: shipped('apps/web/src/'),
    forbids: (to) => to.startsWith('node:') || to === 'packages/kernel/src/node.ts',
  },
  {
    name: 'features-are-islands',
    from: shipped('apps/([^/]+)/src/features/([^/]+)/'),
    forbids: (to, match) => {
      const target = /^apps\/([^/]+)\/src\/features\/([^/]+)\//.exec(to);
      return target !== null && target[1] === match[1] && target[2] !== match[2];
    },
  },
  {
    name: 'sql-lives-in-db',
    from: shipped('(?:apps|packages/(?!db/))'),
    forbids: (to) => /^npm:(drizzle-orm|pg-boss)$/.test(to),
  },
  {
    name: 'queue-library-behind-one-seam',
    from: shipped('packages/db/src/(?!queue|migrate)'),
    forbids: (to) => to === 'npm:pg-boss',
  },
  {
    name: 'worker-speaks-no-http',
    from: shipped('apps/worker/src/'),
    forbids: (to) => /^npm:express|^node:https?$/.test(to),
  },
];
