import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { describe, expect, it } from 'vitest';

const root = join(import.meta.dirname, '..');

function filesUnder(folder: string, ending: RegExp): string[] {
  if (!existsSync(join(root, folder))) return [];
  return readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .map((file) => `${folder}/${file}`)
    .filter((file) => ending.test(file))
    .sort();
}

const sources = ['shared', 'server', 'src'].flatMap((folder) => filesUnder(folder, /\.(ts|tsx|mjs)$/));
const tests = filesUnder('tests', /\.(ts|tsx)$/);

/** Every module that a file names: `from '…'`, `import '…'`, `import('…')`, and stylesheets' `@import "…"`. */
function importsIn(text: string): string[] {
  // Comments could name a module without importing it.
  const code = text.replace(/\/\*[\s\S]*?\*\//g, '').replace(/^\s*\/\/.*$/gm, '');
  const pattern = /(?:\bfrom\s*|\bimport\s*\(?\s*|@import\s+|new URL\(\s*)['"]([^'"\s]+)['"]/g;
  return [...code.matchAll(pattern)].map((match) => match[1] as string);
}

type Import = { readonly file: string; readonly target: string; readonly isLocal: boolean };

const imports: readonly Import[] = sources.flatMap((file) =>
  importsIn(readFileSync(join(root, file), 'utf8')).map((name) => {
    const isLocal = name.startsWith('.');
    const target = isLocal ? relative(root, join(root, dirname(file), name)) : name;
    return { file, target, isLocal };
  }),
);

/** `@scope/name/part` and `name/part` without the part. */
const packageOf = (name: string) =>
  name
    .split('/')
    .slice(0, name.startsWith('@') ? 2 : 1)
    .join('/');

// What a folder may import, besides itself. An entry that ends in / is a folder.
const directions: Readonly<
  Record<string, { readonly local: readonly string[]; readonly packages?: readonly string[] }>
> = {
  'shared/engine/': { local: [], packages: ['mathjs', 'zod'] },
  'shared/domain/': { local: ['shared/engine/'], packages: ['zod', '@casl/ability'] },
  'shared/readings/': { local: ['shared/engine/'], packages: ['papaparse', 'zod'] },
  'shared/api/': { local: ['shared/engine/', 'shared/domain/', 'shared/readings/'], packages: ['zod'] },
  'server/environment.ts': { local: [] },
  'server/db/seed': { local: ['shared/', 'server/'] },
  'server/db/': { local: ['shared/'] },
  'server/notices/': { local: ['shared/', 'server/db/'] },
  'server/http/': { local: ['shared/', 'server/db/', 'server/notices/'] },
  'server/jobs/': { local: ['shared/', 'server/db/', 'server/notices/', 'server/http/'] },
  'server/features/': {
    local: ['shared/', 'server/db/', 'server/notices/', 'server/http/', 'server/jobs/'],
  },
  'server/app.ts': {
    local: ['shared/', 'server/db/', 'server/notices/', 'server/http/', 'server/jobs/', 'server/features/'],
  },
  'server/main.ts': { local: ['shared/', 'server/'] },
  'server/scripts/': { local: ['shared/', 'server/'] },
  'src/api/': { local: ['shared/'] },
  'src/ui/': { local: ['shared/', 'src/api/', 'src/charts/'] },
  'src/charts/': { local: ['shared/', 'src/api/', 'src/ui/'] },
  'src/chain/': { local: ['shared/', 'src/api/', 'src/ui/', 'src/charts/'] },
  'src/features/': { local: ['shared/', 'src/api/', 'src/ui/', 'src/charts/', 'src/chain/'] },
  'src/app/': { local: ['shared/', 'src/'] },
  'src/': { local: ['shared/', 'src/'] },
};

const placeOf = (file: string) => Object.keys(directions).find((place) => file.startsWith(place));
const show = ({ file, target }: Import) => `${file} -> ${target}`;

describe('the house', () => {
  it('reads imports of every form, and none from a comment', () => {
    const text = [
      "import { a } from './a.ts';",
      "import type { b } from './b.ts';",
      "import './c.css';",
      "const d = await import('./d.ts');",
      "export { e } from './e.ts';",
      "// import { f } from './f.ts';",
      "new Worker(new URL('./g.ts', import.meta.url));",
    ].join('\n');

    expect(importsIn(text)).toEqual(['./a.ts', './b.ts', './c.css', './d.ts', './e.ts', './g.ts']);
  });

  it('gives every source file a place in the import direction', () => {
    expect(sources.filter((file) => !placeOf(file))).toEqual([]);
  });

  it('imports in one direction only', () => {
    const wrong = imports.filter(({ file, target, isLocal }) => {
      const place = placeOf(file);
      const rule = place ? directions[place] : undefined;
      if (!place || !rule) return false;
      if (!isLocal) return rule.packages ? !rule.packages.includes(packageOf(target)) : false;
      return !target.startsWith(place) && !rule.local.some((allowed) => target.startsWith(allowed));
    });

    expect(wrong.map(show)).toEqual([]);
  });

  it('keeps features apart: what two of them need lies in a lower layer', () => {
    const featureOf = (path: string) => /^(server|src)\/features\/[^/]+\//.exec(path)?.[0];
    const wrong = imports.filter(({ file, target }) => {
      const [from, to] = [featureOf(file), featureOf(target)];
      return from && to && from !== to;
    });

    expect(wrong.map(show)).toEqual([]);
  });

  it('keeps the server out of the browser and the browser out of the server', () => {
    const nodeOnly = /^(node:|express|mysql2|drizzle-orm|nodemailer|pino)/;
    const wrong = imports.filter(
      ({ file, target }) =>
        (file.startsWith('src/') && (target.startsWith('server/') || nodeOnly.test(target))) ||
        (file.startsWith('server/') && (target.startsWith('src/') || target.startsWith('react'))) ||
        (file.startsWith('shared/') && nodeOnly.test(target)),
    );

    expect(wrong.map(show)).toEqual([]);
  });

  it('reads process.env in server/environment.ts only', () => {
    const readers = sources.filter((file) => readFileSync(join(root, file), 'utf8').includes('process.env'));

    expect(readers).toEqual(['server/environment.ts']);
  });

  it('names local files with their ending', () => {
    const wrong = imports.filter(
      ({ target, isLocal }) => isLocal && !/\.(ts|tsx|mjs|css|json|svg|woff2)(\?\w+)?$/.test(target),
    );

    expect(wrong.map(show)).toEqual([]);
  });

  it('has no file over 400 lines', () => {
    const long = sources
      .map((file) => ({ file, lines: readFileSync(join(root, file), 'utf8').trimEnd().split('\n').length }))
      .filter(({ lines }) => lines > 400);

    expect(long.map(({ file, lines }) => `${file}: ${lines} lines`)).toEqual([]);
  });

  it('has no file whose name could hold anything', () => {
    const vague = /(^|\/)(utils?|helpers?|common|misc|types|index)(\.tsx?$|\/)/;

    expect(sources.filter((file) => vague.test(file))).toEqual([]);
  });

  it('leaves nothing unfinished or unchecked in the sources', () => {
    const patterns = [/\bTODO\b/, /\bFIXME\b/, /@ts-(ignore|nocheck)/, /\bconsole\.(log|warn|error|info|debug)\(/];
    const found = sources.flatMap((file) => {
      const lines = readFileSync(join(root, file), 'utf8').split('\n');
      return lines.flatMap((line, i) => (patterns.some((pattern) => pattern.test(line)) ? [`${file}:${i + 1}`] : []));
    });

    expect(found).toEqual([]);
  });

  it('has the top level that its owner fixed, and what tools demand there', () => {
    const fixed = ['DEVELOPERS.md', 'README.md', 'docs', 'migrations', 'server', 'shared', 'src', 'tests'];
    const tools = ['.ci', '.gitignore', '.npmrc', 'biome.json', 'drizzle.config.ts', 'index.html', 'knip.json'];
    const manifests = ['package-lock.json', 'package.json', 'tsconfig.json', 'vite.config.ts'];
    const notKept = ['.git', 'node_modules', 'dist', '.stemma', 'coverage'];

    const found = readdirSync(root).filter((name) => !notKept.includes(name) && !name.endsWith('.log'));

    expect(found.sort()).toEqual([...fixed, ...tools, ...manifests].sort());
  });

  it('uses every dependency, or says why it is there', () => {
    // Run or read by a tool instead of being imported.
    const reasons: Readonly<Record<string, string>> = {
      maildev: 'started as a program by server/scripts/mail-catcher.ts',
      tsx: 'runs the TypeScript of the server; loaded by server/scripts/bootstrap.mjs',
      typescript: 'npm run types',
      '@testing-library/dom': 'what @testing-library/react stands on',
      jsdom: 'the environment of the jsdom project in vite.config.ts',
      knip: 'npm run unused',
      '@biomejs/biome': 'npm run lint',
    };
    const manifest = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')) as {
      dependencies: Record<string, string>;
      devDependencies: Record<string, string>;
    };
    const configs = ['vite.config.ts', 'drizzle.config.ts'];
    const styles = filesUnder('src', /\.css$/);
    const imported = new Set(
      [...sources, ...tests, ...configs, ...styles].flatMap((file) =>
        importsIn(readFileSync(join(root, file), 'utf8')).map(packageOf),
      ),
    );
    const names = [...Object.keys(manifest.dependencies), ...Object.keys(manifest.devDependencies)];

    const unused = names.filter((name) => {
      // Types belong to the package that they describe.
      const subject = name.startsWith('@types/') ? name.slice('@types/'.length) : name;
      return !imported.has(subject) && !(subject in reasons) && subject !== 'node';
    });

    expect(unused).toEqual([]);
  });
});
