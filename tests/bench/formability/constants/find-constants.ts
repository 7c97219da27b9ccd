import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';

/** One number of the engine's source that decides what the engine says. */
export interface Constant {
  /** Path below lib/formability. */
  file: string;
  line: number;
  /** Offsets of the literal in the source. */
  from: number;
  to: number;
  value: number;
  /** The path of names around it: `FILAMENTS.pla.hdtB[2]`, `solveLane`. */
  name: string;
  /** A threshold: moved down as well as up. */
  threshold: boolean;
}

/** Files whose every number is a value of a table: 1 and 2 count there, too. */
const TABLES =
  /^(limits|recipe|recipe-schema)\.ts$|^materials\/(filaments|sheets)\.ts$|^parse\/(size-caps|3mf\/limits)\.ts$/;
/** Formulas, where small whole numbers are coefficients; elsewhere they are strides and offsets. */
const FORMULAS = /^physics\//;
/** Files of bytes and characters: their unnamed whole numbers are the format itself. */
const FORMATS = /^parse\//;
const STRIDE_TO = 16;

const BITS = new Set([
  ts.SyntaxKind.LessThanLessThanToken,
  ts.SyntaxKind.GreaterThanGreaterThanToken,
  ts.SyntaxKind.GreaterThanGreaterThanGreaterThanToken,
  ts.SyntaxKind.AmpersandToken,
  ts.SyntaxKind.BarToken,
  ts.SyntaxKind.CaretToken,
]);
const COMPARES = new Set([
  ts.SyntaxKind.LessThanToken,
  ts.SyntaxKind.LessThanEqualsToken,
  ts.SyntaxKind.GreaterThanToken,
  ts.SyntaxKind.GreaterThanEqualsToken,
]);
/** Calls whose numbers are digits, widths and counts of a sentence, or bytes and bits of a format. */
const WRITING =
  /^(say|fixed|toFixed|toPrecision|padStart|padEnd|slice|repeat|substring|signed|imul|get\w*(int|float)\w*)$/i;

export function findConstants(root: string): Constant[] {
  const files = (readdirSync(root, { recursive: true }) as string[])
    .filter((file) => file.endsWith('.ts'))
    .sort();
  return files.flatMap((file) => inFile(file, readFileSync(path.join(root, file), 'utf8')));
}

function inFile(file: string, text: string): Constant[] {
  const source = ts.createSourceFile(file, text, ts.ScriptTarget.Latest, true);
  const found: Constant[] = [];
  const visit = (node: ts.Node) => {
    if (ts.isNumericLiteral(node) && isConstant(node, file)) {
      const from = node.getStart();
      found.push({
        file,
        line: source.getLineAndCharacterOfPosition(from).line + 1,
        from,
        to: node.end,
        value: Number(node.text),
        name: nameOf(node),
        threshold: file === 'limits.ts' || isCompared(node),
      });
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

function isConstant(node: ts.NumericLiteral, file: string): boolean {
  const value = Number(node.text);
  const whole = Number.isInteger(value);
  if (value === 0 || /^0[xb]/i.test(node.getText())) return false;
  if (ts.isLiteralTypeNode(node.parent) || inType(node)) return false;
  if (TABLES.test(file)) return !isStructural(node, whole);
  if (isNamed(node)) return true;
  if (isStructural(node, whole)) return false;
  if (whole && (value <= 2 || FORMATS.test(file))) return false;
  if (FORMULAS.test(file) || !whole || value > STRIDE_TO) return true;
  return isListed(node) || (/^checks\//.test(file) && isCompared(node));
}

/** The whole value of an upper-case constant of its module. */
function isNamed(node: ts.Node): boolean {
  let up = node.parent;
  while (ts.isPrefixUnaryExpression(up) || ts.isAsExpression(up)) up = up.parent;
  return ts.isVariableDeclaration(up) && ts.isIdentifier(up.name) && /^[A-Z][A-Z0-9_]+$/.test(up.name.text);
}

/** A value of a list or of a record. */
function isListed(node: ts.Node): boolean {
  return ts.isArrayLiteralExpression(node.parent) || ts.isPropertyAssignment(node.parent);
}

function isCompared(node: ts.Node): boolean {
  return ts.isBinaryExpression(node.parent) && COMPARES.has(node.parent.operatorToken.kind);
}

/** Indices, bits, remainders, sizes of arrays, digits of sentences. */
function isStructural(node: ts.NumericLiteral, whole: boolean): boolean {
  let at: ts.Node = node;
  for (let up = node.parent; up && !ts.isStatement(up); at = up, up = up.parent) {
    if (ts.isElementAccessExpression(up) && up.argumentExpression === at && whole) return true;
    if (ts.isBinaryExpression(up) && whole && BITS.has(up.operatorToken.kind)) return true;
    if (ts.isBinaryExpression(up) && up.operatorToken.kind === ts.SyntaxKind.PercentToken && whole)
      return true;
    if (ts.isPropertyAssignment(up) && /Digits$/.test(up.name.getText())) return true;
    if (ts.isNewExpression(up) && /Array|Buffer$|View$|Growing/.test(up.expression.getText())) return true;
    if (ts.isCallExpression(up) && up.expression !== at) {
      const callee = ts.isPropertyAccessExpression(up.expression)
        ? up.expression.name.text
        : up.expression.getText();
      if (WRITING.test(callee) && at === node && whole) return true;
    }
    if (ts.isFunctionLike(up) || ts.isBlock(up)) return false;
  }
  return whole && ts.isBinaryExpression(node.parent) && ts.isForStatement(node.parent.parent);
}

function inType(node: ts.Node): boolean {
  for (let up = node.parent; up; up = up.parent) {
    if (ts.isTypeNode(up)) return true;
    if (ts.isStatement(up)) return false;
  }
  return false;
}

/** Names from the outside in: declarations, properties, places in lists, functions. */
function nameOf(node: ts.Node): string {
  const names: string[] = [];
  for (let at = node, up = node.parent; up; at = up, up = up.parent) {
    if (ts.isArrayLiteralExpression(up)) names.unshift(`[${up.elements.indexOf(at as ts.Expression)}]`);
    else if (
      (ts.isVariableDeclaration(up) || ts.isPropertyAssignment(up) || ts.isParameter(up) || ts.isFunctionDeclaration(up)
        || ts.isMethodDeclaration(up) || ts.isPropertyDeclaration(up)) && up.name !== at // prettier-ignore
    )
      names.unshift(`.${up.name?.getText() ?? ''}`);
  }
  return names.join('').replace(/^\./, '');
}
