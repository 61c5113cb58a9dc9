// One notebook as the compiler sees it: check and emit a cell, remember what it defined, answer questions.
import type { CheckResult, CommittedCell, EmittedCell } from "../messages.ts";
import { type Finding, findings, typeScriptError } from "./diagnostics.ts";
import { EditedText } from "./edits.ts";
import { exportEdits } from "./exports.ts";
import { NotebookHost, type Places } from "./host.ts";
import { NotebookNames, surroundings } from "./notebook.ts";
import { type Declared, type Outline, outline, syntaxErrors } from "./outline.ts";
import { rewriteCell } from "./rewrite.ts";
import { type SourceMapData, toUserMap } from "./sourcemap.ts";
import { type TS, ts } from "./typescript.ts";

interface Pending {
  readonly declared: readonly Declared[];
  /** The cell as declarations, or its whole text where the compiler cannot name a type. */
  readonly text: string;
}

/** The checker of one notebook. */
export class NotebookTypes {
  readonly names = new NotebookNames();
  readonly host: NotebookHost;
  readonly service: TS.LanguageService;
  readonly #pending = new Map<number, Pending>();
  #library: readonly string[] | undefined;

  constructor(places: Places) {
    this.host = new NotebookHost(places);
    this.service = ts.createLanguageService(this.host, ts.createDocumentRegistry());
  }

  /** Loads library and node types, so that the first cell need not. */
  warm(): void {
    this.check(0, 0, "export const warm: number = [1].map((x) => x + 1).length; console.log(process.argv, await warm)");
    this.host.dropCell(0);
    this.#pending.clear();
  }

  /** Names of the values and types that the library exports. */
  libraryNames(): readonly string[] {
    this.#library ??= this.#readLibraryNames();
    return this.#library;
  }

  /** Checks a cell; if it is right, emits what runs. */
  check(cell: number, executionCount: number, code: string): CheckResult {
    const parsed = outline(code);
    const syntax = syntaxErrors(parsed.source);
    if (syntax.length > 0) return this.#failed(code, executionCount, findings(syntax, new EditedText(code, [])));
    const exported = exportEdits(parsed.source);
    if (exported.refusals.length > 0) return this.#failed(code, executionCount, exported.refusals);
    const edited = new EditedText(code, exported.edits);
    const around = surroundings(
      (name) => parsed.words.has(name),
      parsed.declared,
      this.names,
      this.#visibleLibrary(parsed),
    );
    const file = this.host.cellFile(cell);
    this.host.setCell(cell, edited.text + around.text, true);
    const diagnostics = [...this.service.getSyntacticDiagnostics(file), ...this.service.getSemanticDiagnostics(file)];
    const found = findings(diagnostics, edited);
    if (found.length > 0) {
      this.host.dropCell(cell);
      return this.#failed(code, executionCount, found);
    }
    return { status: "ok", emitted: this.#emit(cell, code, edited, parsed, around.library) };
  }

  /** Records what a cell that ran has defined; undefined if it was not checked here. */
  commit(cell: number, defined: readonly string[], complete: boolean): CommittedCell | undefined {
    const pending = this.#pending.get(cell);
    if (!pending) return undefined;
    this.#pending.delete(cell);
    const values = new Set(defined);
    // What leaves nothing at run time counts once the cell has been checked.
    const names = pending.declared.filter(
      (one) => one.kind === "type" || one.ambient || complete || values.has(one.name),
    );
    const committed = { text: pending.text, names };
    this.restore(cell, committed);
    return committed;
  }

  /** Takes over a committed cell, also from an earlier types process. */
  restore(cell: number, committed: CommittedCell): void {
    this.host.setCell(cell, committed.text, false);
    this.names.define(cell, committed.names as readonly Declared[]);
  }

  /** Forgets every name: their values are lost. */
  reset(): void {
    this.names.clear();
    this.#pending.clear();
  }

  #visibleLibrary(parsed: Outline): readonly string[] {
    return this.libraryNames().filter((name) => parsed.words.has(name));
  }

  #failed(code: string, executionCount: number, found: readonly Finding[]): CheckResult {
    return { status: "error", ...typeScriptError(code, executionCount, found) };
  }

  #emit(cell: number, code: string, edited: EditedText, parsed: Outline, library: ReadonlySet<string>): EmittedCell {
    const program = this.service.getProgram() as TS.Program;
    const source = program.getSourceFile(this.host.cellFile(cell)) as TS.SourceFile;
    const rewriting = rewriteCell(source, program.getTypeChecker(), edited.text.length, library);
    const output = emitFiles(program, source, rewriting.transformer);
    const declared = [...parsed.declared.values()];
    this.#pending.set(cell, { declared, text: output.declarations ?? this.host.cellText(cell) ?? "" });
    const map = toUserMap(JSON.parse(output.map) as SourceMapData, edited, code);
    return { script: output.script, map, prefix: rewriting.prefix, boxes: rewriting.boxes, notices: [] };
  }

  #readLibraryNames(): readonly string[] {
    this.host.setCell(0, `import * as library from "halfperiod"; export { library };`, true);
    const program = this.service.getProgram() as TS.Program;
    const source = program.getSourceFile(this.host.cellFile(0)) as TS.SourceFile;
    const checker = program.getTypeChecker();
    const statement = source.statements[0] as TS.ImportDeclaration;
    const module = checker.getSymbolAtLocation(statement.moduleSpecifier);
    this.host.dropCell(0);
    return module ? checker.getExportsOfModule(module).map((symbol) => symbol.name) : [];
  }
}

interface Output {
  readonly script: string;
  readonly map: string;
  readonly declarations: string | undefined;
}

function emitFiles(program: TS.Program, source: TS.SourceFile, before: TS.TransformerFactory<TS.SourceFile>): Output {
  let script = "";
  let map = "";
  let declarations: string | undefined;
  const write: TS.WriteFileCallback = (name, text) => {
    if (name.endsWith(".d.ts")) declarations = text;
    else if (name.endsWith(".map")) map = text;
    else script = text;
  };
  program.emit(source, write, undefined, false, { before: [before] });
  return { script: bareScript(script), map, declarations };
}

/** Without the marks of a module, which the compiler adds at the end. */
function bareScript(text: string): string {
  return text.replace(/\n\/\/# sourceMappingURL=.*\s*$/, "").replace(/\nexport \{\};?\s*$/, "");
}
