import { describe, expect, it } from 'vitest';
import { importsOf, nodesOf, readSources, resolveImport, type Source } from './sources';
import ts from 'typescript';

interface Room {
  name: string;
  holds: (file: string) => boolean;
  /** Own rooms and packages that may be imported. */
  may: (target: string) => boolean;
}

const under =
  (...folders: string[]) =>
  (file: string) =>
    folders.some((folder) => file === folder || file.startsWith(`${folder}/`));

const isOwn = under('src', 'db', 'tests', 'mail-fake');
const isNode = (target: string) => target.startsWith('node:');

/** Packages without input, output or a clock of their own. */
const PURE = ['astronomy-engine', 'luxon', 'zod', 'ical-generator', 'd3-geo', 'topojson-client'];

/** db/seed/signIns is data alone, shown on the sign-in page of the demo. */
const forComponents = under(
  'src/components',
  'src/domain',
  'src/paths',
  'src/styles',
  'db/seed/signIns',
);

const ROOMS: Room[] = [
  {
    name: 'src/domain imports the domain and pure packages only',
    holds: under('src/domain'),
    may: (target) => under('src/domain')(target) || PURE.includes(target.split('/')[0] ?? ''),
  },
  {
    name: 'src/paths.ts imports nothing',
    holds: (file) => file === 'src/paths.ts',
    may: () => false,
  },
  {
    name: 'src/server imports the domain, the server, paths and migrations',
    holds: under('src/server'),
    may: (target) =>
      isOwn(target)
        ? under('src/server', 'src/domain', 'src/paths', 'db/migrations')(target)
        : !['react', 'react-dom', 'astro:actions'].includes(target),
  },
  {
    name: 'src/components imports the domain, paths and components, and no server package',
    holds: under('src/components'),
    may: (target) =>
      isOwn(target)
        ? forComponents(target)
        : !isNode(target) &&
          !/^(kysely|better-sqlite3|nodemailer|pino|auth-astro|@auth\/|@node-rs\/)/.test(target),
  },
  {
    name: 'src/pages, src/actions, src/layouts and src/worker import no database driver',
    holds: under('src/pages', 'src/actions', 'src/layouts', 'src/worker'),
    may: (target) => !['better-sqlite3', 'nodemailer', 'kysely'].includes(target),
  },
  {
    name: 'src/worker imports the server only',
    holds: under('src/worker'),
    may: (target) => !isOwn(target) || under('src/server', 'src/worker', 'src/domain')(target),
  },
  {
    name: 'a migration imports kysely and other migrations only',
    holds: under('db/migrations'),
    may: (target) => target === 'kysely' || under('db/migrations')(target),
  },
];

const sources = readSources('src', 'db');

describe('imports go one way', () => {
  it.each(ROOMS.map((room) => [room.name, room] as const))('%s', (_name, room) => {
    const held = sources.filter(({ file }) => room.holds(file));
    expect(held.length).toBeGreaterThan(0);
    expect(held.flatMap((source) => forbiddenIn(source, room))).toEqual([]);
  });

  it('nothing but src/cli imports src/cli, and nothing imports pages', () => {
    const wrong = sources.flatMap((source) =>
      importsOf(source)
        .map((specifier) => resolveImport(source.file, specifier))
        .filter(
          (target) =>
            (under('src/cli')(target) && !under('src/cli')(source.file)) ||
            under('src/pages')(target),
        )
        .map((target) => `${source.file} → ${target}`),
    );
    expect(wrong).toEqual([]);
  });
});

describe('the domain has no surroundings', () => {
  const domain = sources.filter(({ file }) => under('src/domain')(file));

  it('reads neither clock, nor chance, nor environment', () => {
    expect(domain.flatMap(surroundingsIn)).toEqual([]);
  });
});

function forbiddenIn(source: Source, room: Room): string[] {
  return importsOf(source)
    .map((specifier) => resolveImport(source.file, specifier))
    .filter((target) => !room.may(target))
    .map((target) => `${source.file} → ${target}`);
}

function surroundingsIn({ file, tree }: Source): string[] {
  return [...nodesOf(tree)]
    .filter((node) => {
      if (ts.isNewExpression(node)) {
        return node.expression.getText() === 'Date' && (node.arguments?.length ?? 0) === 0;
      }
      if (ts.isPropertyAccessExpression(node)) {
        const text = node.getText();
        return (
          /^(Date\.now|Math\.random|performance\.now|DateTime\.(now|utc|local))$/.test(text) &&
          !isCallWithArguments(node)
        );
      }
      return ts.isIdentifier(node) && ['process', 'document', 'localStorage'].includes(node.text);
    })
    .filter((node) => !isNameOnly(node))
    .map((node) => `${file}: ${node.getText()}`);
}

/** `DateTime.utc(2027, 1, 18)` builds an instant; without arguments it reads the clock. */
function isCallWithArguments(node: ts.Node): boolean {
  const call = node.parent;
  return ts.isCallExpression(call) && call.expression === node && call.arguments.length > 0;
}

/** A property or parameter may be called "process". */
function isNameOnly(node: ts.Node): boolean {
  const { parent } = node;
  return (
    ts.isIdentifier(node) &&
    ((ts.isPropertyAccessExpression(parent) && parent.name === node) ||
      ts.isPropertyAssignment(parent) ||
      ts.isPropertySignature(parent) ||
      ts.isParameter(parent))
  );
}
