// What a confined cell may not even be checked with: every way to name a file or a module other than the library. The
// checker would read it, and tell of it in its messages.
import type { Finding } from "../types/diagnostics.ts";
import { LIBRARY } from "../types/notebook.ts";
import { type TS, ts } from "../types/typescript.ts";

const MESSAGE = `a confined cell can import "${LIBRARY}" alone: no files, packages or modules of Node. Run the notebook without --confined if you trust it.`;

/** The places of a cell that reach outside. */
export function confinedRefusals(source: TS.SourceFile): Finding[] {
  const found: Finding[] = [...references(source)];
  const refuse = (node: TS.Node) => {
    const start = node.getStart(source);
    found.push({ code: "confined", message: MESSAGE, start, length: node.end - start });
  };
  const visit = (node: TS.Node): void => {
    if (reachesOut(node)) refuse(node);
    else ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

/** `/// <reference path="..." />` and its kin. */
function references(source: TS.SourceFile): Finding[] {
  const all = [...source.referencedFiles, ...source.typeReferenceDirectives, ...source.libReferenceDirectives];
  return all.map(({ pos, end }) => ({ code: "confined", message: MESSAGE, start: pos, length: end - pos }));
}

function reachesOut(node: TS.Node): boolean {
  if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) {
    return node.moduleSpecifier !== undefined && !isLibrary(node.moduleSpecifier);
  }
  if (ts.isExternalModuleReference(node)) return !isLibrary(node.expression);
  if (ts.isImportTypeNode(node)) return !(ts.isLiteralTypeNode(node.argument) && isLibrary(node.argument.literal));
  if (ts.isModuleDeclaration(node)) return ts.isStringLiteral(node.name);
  return (
    ts.isCallExpression(node) &&
    node.expression.kind === ts.SyntaxKind.ImportKeyword &&
    !(node.arguments.length === 1 && isLibrary(node.arguments[0] as TS.Node))
  );
}

function isLibrary(node: TS.Node): boolean {
  return ts.isStringLiteralLike(node) && node.text === LIBRARY;
}
