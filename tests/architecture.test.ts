import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';
import { describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '..');
const ours = [
  'shared',
  'server',
  'src',
  'fake-oauth',
  'fake-smtp',
  'migrations',
  'seeds',
  'tests',
  'benchmarks',
] as const;

interface Import {
  readonly file: string;
  /** A path from the root when it is ours, else the package's name. */
  readonly target: string;
  readonly isOurs: boolean;
}

function sourceFiles(folder: string): string[] {
  return readdirSync(path.join(root, folder), { recursive: true, encoding: 'utf8' })
    .map((name) => path.join(folder, name))
    .filter((name) => /\.(?:ts|tsx|mjs)$/u.test(name));
}

function packageName(specifier: string): string {
  const [first = '', second = ''] = specifier.split('/');
  return specifier.startsWith('@') ? `${first}/${second}` : first;
}

function importsOf(file: string): Import[] {
  const { importedFiles } = ts.preProcessFile(readFileSync(path.join(root, file), 'utf8'), true, true);
  return importedFiles.map(({ fileName }) => {
    const isOurs = fileName.startsWith('.');
    const target = isOurs ? path.normalize(path.join(path.dirname(file), fileName)) : packageName(fileName);
    return { file, target, isOurs };
  });
}

const imports = ours.flatMap(sourceFiles).flatMap(importsOf);
const from = (folder: string) => imports.filter(({ file }) => file.startsWith(`${folder}/`));
const say = ({ file, target }: Import) => `${file} imports ${target}`;

/** The feature that a path belongs to, as "src/features/cabinet"; null outside the features. */
function featureOf(name: string): string | null {
  const [top, features, feature] = name.split(path.sep);
  return features === 'features' && feature !== undefined ? `${String(top)}/features/${feature}` : null;
}

describe('what may import what', () => {
  it('finds the imports that it judges', () => {
    expect(imports.length).toBeGreaterThan(100);
  });

  it('keeps shared pure: nothing of ours outside it, and only small pure packages', () => {
    const packages = new Set(['zod', 'complex.js', 'canonicalize', '@noble/hashes', 'papaparse']);
    const wrong = from('shared').filter(({ target, isOurs }) =>
      isOurs ? !target.startsWith('shared/') : !packages.has(target),
    );
    expect(wrong.map(say)).toEqual([]);
  });

  it('keeps server and client apart: each imports shared, never the other', () => {
    const wrong = [
      ...from('server').filter(({ target, isOurs }) => isOurs && !/^(?:server|shared)\//u.test(target)),
      ...from('src').filter(({ target, isOurs }) => isOurs && !/^(?:src|shared)\//u.test(target)),
    ];
    expect(wrong.map(say)).toEqual([]);
  });

  it('lets a feature import another only through its public file', () => {
    const wrong = [...from('src'), ...from('server')].filter(({ file, target, isOurs }) => {
      const feature = featureOf(target);
      if (!isOurs || feature === null || feature === featureOf(file)) return false;
      const isPublicFile = target === feature || target === `${feature}/index`;
      // The router names pages by file, so that each is a script of its own.
      const isRoute = file === 'src/app/router.tsx' && target.endsWith('Page');
      return !isPublicFile && !isRoute;
    });
    expect(wrong.map(say)).toEqual([]);
  });

  it('keeps the fakes strangers: they import nothing of ours', () => {
    const fakes = ['fake-oauth', 'fake-smtp'];
    const wrong = fakes.flatMap((fake) =>
      from(fake).filter(({ target, isOurs }) => isOurs && !target.startsWith(`${fake}/`)),
    );
    expect(wrong.map(say)).toEqual([]);
  });

  it('lets nothing import tests or seeds', () => {
    const wrong = imports.filter(
      ({ file, target, isOurs }) =>
        isOurs &&
        ['tests', 'seeds'].some(
          (folder) => target.startsWith(`${folder}/`) && !file.startsWith(`${folder}/`),
        ),
    );
    expect(wrong.map(say)).toEqual([]);
  });

  it('gives a class of a stylesheet to one folder: what one page brings stays when the next is shown', () => {
    const owners = new Map<string, Set<string>>();
    for (const file of readdirSync(path.join(root, 'src'), { recursive: true, encoding: 'utf8' })) {
      if (!file.endsWith('.css')) continue;
      const text = readFileSync(path.join(root, 'src', file), 'utf8');
      for (const [, name = ''] of text.matchAll(/^\s*\.([a-z][\w-]*)/gmu)) {
        owners.set(name, (owners.get(name) ?? new Set()).add(path.dirname(file)));
      }
    }
    expect(owners.size).toBeGreaterThan(100);
    const shared = [...owners].filter(([, folders]) => folders.size > 1).map(([name]) => name);
    expect(shared).toEqual([]);
  });

  it('keeps three.js out of every script but the sphere', () => {
    const wrong = from('src').filter(
      ({ file, target }) => /^(?:three|@react-three\/.*)$/u.test(target) && !file.startsWith('src/sphere/'),
    );
    expect(wrong.map(say)).toEqual([]);
  });
});
