/** The project's own source as facts: what each file imports, calls and exports. Parsed, not type-checked: a second for all. */
import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, posix } from 'node:path';
import { fileURLToPath } from 'node:url';
import ts from 'typescript';

export const root = fileURLToPath(new URL('../..', import.meta.url));

/** Made by tools or by running; git ignores them too. */
const notSource = new Set(['node_modules', 'dist', '.data', '.git', 'coverage']);

/** Every file under a folder of the project, as a path from the root with forward slashes. */
export function filesUnder(folder: string): string[] {
  return readdirSync(join(root, folder), { withFileTypes: true }).flatMap((entry) => {
    if (notSource.has(entry.name)) return [];
    const path = posix.join(folder, entry.name);
    return entry.isDirectory() ? filesUnder(path) : [path];
  });
}

export const textOf = (path: string): string => readFileSync(join(root, path), 'utf8');

export interface Import {
  /** Path from the root for our own files, else the package or built-in as written. */
  target: string;
  isOurs: boolean;
  /** `import type …`, or every name marked `type`: gone at run time. */
  isTypeOnly: boolean;
}

export interface Export {
  name: string;
  isFunction: boolean;
  /** The doc comment before it, or nothing. */
  doc: string;
}

export interface SourceFile {
  path: string;
  lines: number;
  imports: Import[];
  exports: Export[];
  /** What is called, as written without spaces: `io.to(room).emit` → `.emit`, `Date.now`, `toFixed`. */
  calls: string[];
  /** `new X(…)`: the class and its number of arguments. */
  creations: { name: string; argumentCount: number; firstText: string | null }[];
  /** Property reads of a plain name: `process.env`. */
  reads: Set<string>;
  hasAny: boolean;
  /** Every string written in the code, without the import paths. */
  strings: Set<string>;
}

const isTypeOnlyImport = (node: ts.ImportDeclaration | ts.ExportDeclaration): boolean => {
  if (ts.isExportDeclaration(node)) return node.isTypeOnly;
  const clause = node.importClause;
  if (!clause) return false;
  if (clause.phaseModifier === ts.SyntaxKind.TypeKeyword) return true;
  const named = clause.namedBindings;
  return !clause.name && !!named && ts.isNamedImports(named) && named.elements.every((one) => one.isTypeOnly);
};

function importOf(path: string, written: string, isTypeOnly: boolean): Import {
  const isOurs = written.startsWith('.');
  const target = isOurs ? posix.join(dirname(path), written) : written;
  return { target, isOurs, isTypeOnly };
}

const isExported = (node: ts.Statement): boolean =>
  ts.canHaveModifiers(node) &&
  (ts.getModifiers(node) ?? []).some(({ kind }) => kind === ts.SyntaxKind.ExportKeyword);

function exportsOf(node: ts.Statement, text: string): Export[] {
  if (!isExported(node)) return [];
  const docs = (ts.getLeadingCommentRanges(text, node.getFullStart()) ?? [])
    .map(({ pos, end }) => text.slice(pos, end))
    .filter((comment) => comment.startsWith('/**'));
  const doc = docs.at(-1) ?? '';
  if (ts.isVariableStatement(node))
    return node.declarationList.declarations.map((one) => ({
      name: one.name.getText(),
      isFunction: !!one.initializer && ts.isArrowFunction(one.initializer),
      doc,
    }));
  if (ts.isFunctionDeclaration(node)) return [{ name: node.name?.text ?? 'default', isFunction: true, doc }];
  const { name } = node as ts.Statement & { name?: ts.Identifier };
  return name ? [{ name: name.text, isFunction: false, doc }] : [];
}

const shortCallee = (callee: ts.Expression): string => {
  if (ts.isIdentifier(callee)) return callee.text;
  if (!ts.isPropertyAccessExpression(callee)) return '';
  return ts.isIdentifier(callee.expression)
    ? `${callee.expression.text}.${callee.name.text}`
    : `.${callee.name.text}`;
};

function readNode(node: ts.Node, file: SourceFile): void {
  if (node.kind === ts.SyntaxKind.AnyKeyword) file.hasAny = true;
  if (ts.isStringLiteralLike(node)) file.strings.add(node.text);
  if (ts.isPropertyAccessExpression(node) && ts.isIdentifier(node.expression))
    file.reads.add(`${node.expression.text}.${node.name.text}`);
  if (ts.isNewExpression(node)) {
    const [first] = node.arguments ?? [];
    const firstText = first && ts.isStringLiteralLike(first) ? first.text : null;
    file.creations.push({
      name: node.expression.getText(),
      argumentCount: node.arguments?.length ?? 0,
      firstText,
    });
  }
  if (ts.isCallExpression(node)) {
    if (node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      const [written] = node.arguments;
      if (written && ts.isStringLiteralLike(written))
        file.imports.push(importOf(file.path, written.text, false));
    } else file.calls.push(shortCallee(node.expression));
  }
}

function parse(path: string): SourceFile {
  const text = textOf(path);
  const tree = ts.createSourceFile(path, text, ts.ScriptTarget.ES2022, true);
  const file: SourceFile = {
    path,
    lines: text.split('\n').length - 1,
    imports: [],
    exports: tree.statements.flatMap((node) => exportsOf(node, text)),
    calls: [],
    creations: [],
    reads: new Set(),
    hasAny: false,
    strings: new Set(),
  };
  const visit = (node: ts.Node): void => {
    if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) {
      const from = node.moduleSpecifier;
      if (from && ts.isStringLiteral(from))
        file.imports.push(importOf(path, from.text, isTypeOnlyImport(node)));
      return;
    }
    readNode(node, file);
    ts.forEachChild(node, visit);
  };
  ts.forEachChild(tree, visit);
  return file;
}

const isCode = (path: string): boolean => /\.(ts|tsx|mjs|mts|js)$/.test(path) && !path.endsWith('.d.mts');

/** Code below the given folders. */
export const codeUnder = (...folders: string[]): SourceFile[] =>
  folders.flatMap(filesUnder).filter(isCode).map(parse);
