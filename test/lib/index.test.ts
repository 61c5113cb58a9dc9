import { fileURLToPath } from "node:url";
import ts from "typescript";
import { describe, expect, it } from "vitest";
import * as names from "../../lib/index.ts";

const file = fileURLToPath(new URL("../../lib/index.ts", import.meta.url));
const program = ts.createProgram([file], {
  target: ts.ScriptTarget.ES2023,
  module: ts.ModuleKind.NodeNext,
  moduleResolution: ts.ModuleResolutionKind.NodeNext,
  allowImportingTsExtensions: true,
  noEmit: true,
  skipLibCheck: true,
});
const checker = program.getTypeChecker();

/** Exported symbols of a module, namespaces opened, as dotted names. */
function exported(module: ts.Symbol, prefix = ""): [string, ts.Symbol][] {
  return checker.getExportsOfModule(module).flatMap((symbol): [string, ts.Symbol][] => {
    const target = symbol.flags & ts.SymbolFlags.Alias ? checker.getAliasedSymbol(symbol) : symbol;
    const name = prefix + symbol.name;
    return target.flags & ts.SymbolFlags.Module ? exported(target, `${name}.`) : [[name, target]];
  });
}

describe("the names of a cell", () => {
  const module = checker.getSymbolAtLocation(program.getSourceFile(file)!)!;
  const all = exported(module);

  it("each has a docstring that an inspection finds — oracle: the type checker", () => {
    const bare = all.filter(([, symbol]) => symbol.getDocumentationComment(checker).length === 0).map(([name]) => name);
    expect(bare).toEqual([]);
  });

  it("all values are there at run time", () => {
    const values = all.filter(([, symbol]) => symbol.flags & ts.SymbolFlags.Value).map(([name]) => name.split(".")[0]);
    expect(Object.keys(names).sort()).toEqual([...new Set(values)].sort());
  });
});
