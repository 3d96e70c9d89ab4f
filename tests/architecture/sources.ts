import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';

export interface Source {
  /** From the project's root, with forward slashes. */
  file: string;
  tree: ts.SourceFile;
}

/** Every TypeScript and Astro file under some folders, parsed; of an Astro file its frontmatter. */
export function readSources(...folders: string[]): Source[] {
  return folders
    .flatMap(filesIn)
    .filter((file) => /\.(ts|tsx|mjs|astro)$/.test(file))
    .map((file) => ({ file, tree: parse(file) }));
}

export function filesIn(folder: string): string[] {
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => path.posix.join(entry.parentPath.replaceAll(path.sep, '/'), entry.name))
    .sort();
}

function parse(file: string): ts.SourceFile {
  const text = readFileSync(file, 'utf8');
  const code = file.endsWith('.astro')
    ? (/^---\r?\n([\s\S]*?)\r?\n---/.exec(text)?.[1] ?? '')
    : text;
  const kind = file.endsWith('.ts') ? ts.ScriptKind.TS : ts.ScriptKind.TSX;
  return ts.createSourceFile(file, code, ts.ScriptTarget.Latest, true, kind);
}

/** Every node below `root`, itself included. */
export function* nodesOf(root: ts.Node): Generator<ts.Node> {
  yield root;
  const children: ts.Node[] = [];
  ts.forEachChild(root, (child) => {
    children.push(child);
  });
  for (const child of children) yield* nodesOf(child);
}

/** What a file imports, also by `import()` and re-exports, as it is written. */
export function importsOf({ tree }: Source): string[] {
  return [...nodesOf(tree)].flatMap((node) => {
    if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) {
      return node.moduleSpecifier && ts.isStringLiteral(node.moduleSpecifier)
        ? [node.moduleSpecifier.text]
        : [];
    }
    if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) {
      return ts.isStringLiteral(node.argument.literal) ? [node.argument.literal.text] : [];
    }
    if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      const [first] = node.arguments;
      return first && ts.isStringLiteral(first) ? [first.text] : [];
    }
    return [];
  });
}

/** Where an import leads: a path from the root for our own files, else the name of the package. */
export function resolveImport(file: string, specifier: string): string {
  if (specifier.startsWith('~/')) return `src/${specifier.slice(2)}`;
  if (specifier.startsWith('.')) return path.posix.join(path.posix.dirname(file), specifier);
  return specifier;
}
