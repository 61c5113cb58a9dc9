// One notebook as the compiler sees it: check and emit a cell, remember what it defined, answer questions.
import { confinedRefusals } from "../confined/refusals.ts";
import type { CheckResult, CommittedCell, EmittedCell } from "../messages.ts";
import { goesBeyondBasics, type NodeWords, readNodeWords } from "./basics.ts";
import { type Finding, findings, throughEdits, typeScriptError } from "./diagnostics.ts";
import { type Edit, EditedText, inOrder } from "./edits.ts";
import { exportEdits } from "./exports.ts";
import { NotebookHost, type Places, registry } from "./host.ts";
import { LIBRARY, NotebookNames, seesLibrary, surroundings } from "./notebook.ts";
import { emitOperators } from "./operator-emit.ts";
import { operatorFindings } from "./operator-findings.ts";
import { hasOperators, OPERATORS, operatorEdits, operatorImport, operatorPrefix, typesPrefix } from "./operators.ts";
import { type Declared, type Outline, outline, syntaxErrors } from "./outline.ts";
import { rewriteCell } from "./rewrite.ts";
import { finalObjectEdits, loopNotices, textNotices, withHint } from "./slips.ts";
import { type SourceMapData, toUserMap } from "./sourcemap.ts";
import { type TS, ts } from "./typescript.ts";
import { Values } from "./values.ts";
import { type WrittenCell, writtenCell } from "./written-cell.ts";

/** A cell as it is checked. */
interface Prepared {
  readonly edited: EditedText;
  /** Text behind the edited one. */
  readonly around: string;
  readonly library: ReadonlySet<string>;
  /** Names of earlier cells in it. */
  readonly uses: EmittedCell["uses"];
  /** Name of the operators' module in the text, if it has operators that could meet a library value. */
  readonly operators: string | undefined;
}

interface Pending {
  readonly declared: readonly Declared[];
  /** The cell as declarations, or its whole text where the compiler cannot name a type. */
  readonly text: string;
}

/** Cells that use what most cells use. The last one leaves the program in the state in which a plain cell finds it. */
const WARMING = [
  "const half = real('0.5'); let sum = half; for (const k of [1, 2, 3]) sum += k * half; sum",
  "const numbers: number[] = [1].map((x) => x + 1); function twice(x: number) { return 2 * x } numbers.map(twice)",
  "const E = curve`y^2 + y = x^3 - x`; const [P] = [E.point(0, 0)]; console.log(-P, 3/7 * E.lattice().periods[0]); 2 * P",
  "const two: number = 1 + 1; two",
];

/**
 * Number of the file in which a cell is checked. One file for all: a program whose root has another name is made anew
 * from all its files, one whose root has the same imports is taken over.
 */
export const CURRENT = 999_999_998;

/** Names of a library by its folder; a snapshot keeps them, and saves a start one whole program. */
const librariesRead = new Map<string, readonly string[]>();

/** The checker of one notebook. */
export class NotebookTypes {
  readonly names = new NotebookNames();
  readonly host: NotebookHost;
  readonly service: TS.LanguageService;
  readonly #pending = new Map<number, Pending>();
  /** The cell that was found right last. */
  #last: Prepared | undefined;
  /** Where Node's whole types are not read yet: what tells that they are needed. */
  #nodeWords: NodeWords | undefined;

  /** `wholeNode` false: Node's whole types are read when a cell needs them; `warm` finds out when. */
  constructor(places: Places, wholeNode = true) {
    this.host = new NotebookHost(places, wholeNode);
    this.service = ts.createLanguageService(this.host, registry);
  }

  /** Loads what cells need and compiles what checks them, so that the first cell need not wait for it. */
  warm(): void {
    for (const cell of WARMING) this.check(0, 0, cell);
    this.reset();
    if (this.host.wholeNode) return;
    const { nodeFolder } = this.host;
    if (nodeFolder !== undefined) this.#nodeWords = readNodeWords(nodeFolder, this.#languageTypes());
  }

  /** Turns to the notebook of another folder, with the same installation. */
  move(places: Places): void {
    this.host.move(places);
  }

  /** Global names that only Node's whole types declare, while these are not read. */
  get unreadGlobals(): readonly string[] {
    return this.host.wholeNode ? [] : (this.#nodeWords?.globals ?? []);
  }

  /** Reads Node's whole types if a text speaks of what they alone declare. */
  readNodeIfNeeded(code: string, { words, texts }: Outline): void {
    if (this.host.wholeNode) return;
    const known = this.#nodeWords?.words;
    const imports = /\b(?:import|require)\b/.test(code) && [...texts].some((text) => text !== LIBRARY);
    const spoken = known !== undefined && [...words].some((word) => known.has(word));
    const needed = spoken || imports || goesBeyondBasics(code, words) || /\busing\b|\/\/\/\s*</.test(code);
    if (needed) this.host.readWholeNode();
  }

  /** Names of the interfaces that the language itself declares. */
  #languageTypes(): Set<string> {
    const program = this.service.getProgram() as TS.Program;
    const files = program.getSourceFiles().filter((file) => program.isSourceFileDefaultLibrary(file));
    const interfaces = files.flatMap((file) => file.statements.filter(ts.isInterfaceDeclaration));
    return new Set(interfaces.map(({ name }) => name.text));
  }

  /** Names of the values and types that the library exports. */
  libraryNames(): readonly string[] {
    const file = this.host.libraryFolder;
    const known = librariesRead.get(file);
    if (known) return known;
    const names = this.#readLibraryNames();
    librariesRead.set(file, names);
    return names;
  }

  /** Checks a cell; if it is right, emits what runs. */
  check(cell: number, executionCount: number, code: string): CheckResult {
    const typed = outline(code);
    const braced = new EditedText(
      code,
      finalObjectEdits(code, typed, (text) => outline(text).source),
    );
    const text = braced.text;
    const parsed = text === code ? typed : outline(text);
    const failed = (found: readonly Finding[]): CheckResult => {
      const shown = found.map((one) => withHint(throughEdits(one, braced), code));
      return { status: "error", ...typeScriptError(code, executionCount, shown) };
    };
    const syntax = syntaxErrors(parsed.source);
    if (syntax.length > 0) return failed(findings(syntax, new EditedText(text, [])));
    const reaching = this.host.confined ? confinedRefusals(parsed.source) : [];
    if (reaching.length > 0) return failed(reaching);
    const exported = exportEdits(parsed.source);
    if (exported.refusals.length > 0) return failed(exported.refusals);
    this.readNodeIfNeeded(text, parsed);
    const prepared = this.#prepare(text, parsed, exported.edits);
    this.host.setCell(CURRENT, prepared.edited.text + prepared.around, true);
    const found = this.#findings(this.host.cellFile(CURRENT), text, prepared);
    if (found.length > 0) return failed(found);
    this.#last = prepared;
    const emitted = this.#emit(cell, text, prepared, parsed);
    return { status: "ok", emitted: { ...emitted, map: toUserMap(emitted.map, braced, code) } };
  }

  /** The text to check: operators as calls where library values may be met, and what stands around. */
  #prepare(code: string, parsed: Outline, exported: readonly Edit[]): Prepared {
    const around = surroundings(
      (name) => parsed.words.has(name),
      parsed.declared,
      this.names,
      this.#visibleLibrary(parsed),
      typesPrefix(operatorPrefix(code)),
    );
    const directed = seesLibrary(around, parsed.texts) && hasOperators(parsed.source);
    const { library } = around;
    const uses = around.notebook.map(({ name, cell }) => ({ name, cell }));
    if (!directed) {
      const text = `${around.text}\nimport {} from "${OPERATORS}";`;
      return { edited: new EditedText(code, exported), around: text, library, uses, operators: undefined };
    }
    const operators = operatorPrefix(code);
    const edits = inOrder([...exported, ...operatorEdits(parsed.source, operators)]);
    return {
      edited: new EditedText(code, edits),
      around: `${around.text}\n${operatorImport(operators)}`,
      library,
      uses,
      operators,
    };
  }

  #findings(file: string, code: string, { edited, operators, library, uses }: Prepared): Finding[] {
    // Of the program, not of the service: that would also find what cannot be written into declarations, which no cell needs.
    const program = this.service.getProgram() as TS.Program;
    const checked = program.getSourceFile(file);
    const found = findings(
      [...program.getSyntacticDiagnostics(checked), ...program.getSemanticDiagnostics(checked)],
      edited,
      (name) => uses.some((use) => use.name === name),
    );
    if (operators === undefined && library.size === 0 && this.names.size === 0) return found;
    const values = new Values(program.getTypeChecker(), this.host.libraryFolder);
    const source = program.getSourceFile(file) as TS.SourceFile;
    const own = operatorFindings(source, operators ?? "", values, edited, code);
    // What follows from an impossible operation is said once, at the operation.
    return own.length === 0 ? found : [...own, ...found.filter((one) => !followsFromOperator(one))];
  }

  /** Names that a checked cell declares, before it is committed. */
  declared(cell: number): readonly string[] {
    return (this.#pending.get(cell)?.declared ?? []).map(({ name }) => name);
  }

  /** The cell that was found right last, as plain TypeScript; `rename` gives top-level names other ones. */
  writeOut(rename: (name: string) => string): WrittenCell | undefined {
    const prepared = this.#last;
    if (!prepared) return undefined;
    const program = this.service.getProgram() as TS.Program;
    const source = program.getSourceFile(this.host.cellFile(CURRENT)) as TS.SourceFile;
    const checker = program.getTypeChecker();
    const values = new Values(checker, this.host.libraryFolder);
    const { edited, library, operators } = prepared;
    return writtenCell({ source, userEnd: edited.text.length, checker, values, operators, library, rename });
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
    this.names.define(cell, committed.names as readonly Declared[], committed.text);
  }

  /** Forgets every name: their values are lost. */
  reset(): void {
    this.names.clear();
    this.#pending.clear();
  }

  #visibleLibrary(parsed: Outline): readonly string[] {
    return this.libraryNames().filter((name) => parsed.words.has(name));
  }

  #emit(cell: number, code: string, prepared: Prepared, parsed: Outline): EmittedCell {
    const { edited, library, operators } = prepared;
    const program = this.service.getProgram() as TS.Program;
    const source = program.getSourceFile(this.host.cellFile(CURRENT)) as TS.SourceFile;
    const checker = program.getTypeChecker();
    const values = new Values(checker, this.host.libraryFolder);
    const emit = operators === undefined ? undefined : emitOperators(operators, values);
    const rewriting = rewriteCell(source, checker, edited.text.length, library, emit);
    const output = emitFiles(program, source, rewriting.transformer);
    const declared = [...parsed.declared.values()];
    // A `var` inside a block is no part of the declarations that the compiler writes.
    const frozen = parsed.nestedVar ? undefined : output.declarations;
    this.#pending.set(cell, { declared, text: frozen ?? this.host.cellText(CURRENT) ?? "" });
    const map = toUserMap(JSON.parse(output.map) as SourceMapData, edited, code);
    const notices = textNotices(parsed, new Set(this.libraryNames()));
    if (operators !== undefined) notices.push(...loopNotices(source, operators, values, checker));
    return {
      script: output.script,
      map,
      prefix: rewriting.prefix,
      boxes: rewriting.boxes,
      uses: prepared.uses,
      notices,
    };
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

/** The compiler's own words for operands that are no numbers. */
const OPERAND_CODES = new Set(["TS2356", "TS2362", "TS2363", "TS2365", "TS2367"]);

function followsFromOperator(one: Finding): boolean {
  return one.message.includes("NoOp<") || OPERAND_CODES.has(one.code);
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
