import ts from 'typescript';
import { describe, expect, it } from 'vitest';
import { filesIn, nodesOf, readSources, type Source } from './sources';

/** Something that can be asked for from outside, and the guards it calls. */
interface Entrance {
  name: string;
  guards: string[];
}

const GUARDS = ['openToAll', 'requirePerson', 'requireRole'];
const METHODS = ['GET', 'HEAD', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS', 'ALL'];

const entrances = [
  ...readSources('src/pages').flatMap(entrancesOfRoute),
  ...readSources('src/actions').flatMap(entrancesOfActions),
];

describe('every entrance calls exactly one guard', () => {
  it('lists them', () => {
    const width = Math.max(...entrances.map(({ name }) => name.length));
    console.log(
      entrances.map(({ name, guards }) => `${name.padEnd(width)}  ${guards.join(', ')}`).join('\n'),
    );
    expect(entrances.length).toBeGreaterThan(10);
  });

  it.each(entrances.map((entrance) => [entrance.name, entrance] as const))(
    '%s',
    (_name, { guards }) => {
      expect(guards).toHaveLength(1);
    },
  );

  it('finds an entrance in every file under src/pages', () => {
    const without = filesIn('src/pages').filter(
      (file) => !entrances.some(({ name }) => name.startsWith(file)),
    );
    expect(without).toEqual([]);
  });
});

function entrancesOfRoute(source: Source): Entrance[] {
  if (source.file.endsWith('.astro')) {
    return [{ name: source.file, guards: guardsIn(source.tree) }];
  }
  return source.tree.statements.flatMap((statement) => {
    if (!isExported(statement)) return [];
    if (ts.isFunctionDeclaration(statement) && METHODS.includes(statement.name?.text ?? '')) {
      return [{ name: `${source.file} ${statement.name?.text}`, guards: guardsIn(statement) }];
    }
    if (!ts.isVariableStatement(statement)) return [];
    return statement.declarationList.declarations
      .filter(({ name }) => METHODS.includes(name.getText()))
      .map((declaration) => ({
        name: `${source.file} ${declaration.name.getText()}`,
        guards: guardsIn(declaration),
      }));
  });
}

/** Each call that makes an action, named by the property that holds it. */
function entrancesOfActions(source: Source): Entrance[] {
  if (source.file === 'src/actions/form.ts') return [];
  return [...nodesOf(source.tree)]
    .filter(ts.isCallExpression)
    .filter((call) => ['formAction', 'defineAction'].includes(call.expression.getText()))
    .map((call) => {
      const { parent } = call;
      const named = ts.isPropertyAssignment(parent) || ts.isVariableDeclaration(parent);
      return {
        name: `${source.file} ${named ? parent.name.getText() : '(unnamed)'}`,
        guards: guardsIn(call),
      };
    });
}

function guardsIn(root: ts.Node): string[] {
  return [...nodesOf(root)]
    .filter(ts.isCallExpression)
    .filter((call) => GUARDS.includes(call.expression.getText()))
    .map((call) => call.getText());
}

function isExported(statement: ts.Statement): boolean {
  return (
    ts.canHaveModifiers(statement) &&
    (ts.getModifiers(statement)?.some(({ kind }) => kind === ts.SyntaxKind.ExportKeyword) ?? false)
  );
}
