// Outputs of a run by the rules of nbformat: streams merged, displays updated wherever they stand, clear_output with
// and without wait, transient data never stored.
import type { Bundle, Output, StreamOutput } from "./format.ts";

/** An output message as it comes from the kernel: its type and content. */
export interface OutputMessage {
  readonly type: string;
  readonly content: Bundle;
}

/** The outputs of one cell while it runs. */
export interface CellOutputs {
  readonly outputs: readonly Output[];
  /** Takes one message; false if the message is not about outputs. */
  take(message: OutputMessage): boolean;
  /** Adds an output of the client's own, such as the news that the kernel died. */
  append(output: Output): void;
}

/** Collects the outputs of a notebook's cells; displays may be updated from any later cell. */
export class OutputCollector {
  readonly #displays = new Map<string, { list: Output[]; index: number }[]>();

  /** The collector of one cell's outputs, empty. */
  cell(): CellOutputs {
    const outputs: Output[] = [];
    let clearFirst = false;
    const append = (output: Output, displayId?: string) => {
      if (clearFirst) this.#clear(outputs);
      clearFirst = false;
      if (output.output_type === "stream" && mergeStream(outputs, output)) return;
      outputs.push(output);
      if (displayId !== undefined) this.#remember(displayId, outputs);
    };
    const take = ({ type, content }: OutputMessage): boolean => {
      if (type === "clear_output") {
        if (content.wait === true) clearFirst = true;
        else this.#clear(outputs);
        return true;
      }
      if (type === "update_display_data") {
        this.#update(content);
        return true;
      }
      const output = outputOf(type, content);
      if (output) append(output, displayIdOf(content));
      return output !== undefined;
    };
    return { outputs, take, append };
  }

  #remember(displayId: string, list: Output[]): void {
    const places = this.#displays.get(displayId) ?? [];
    places.push({ list, index: list.length - 1 });
    this.#displays.set(displayId, places);
  }

  #update(content: Bundle): void {
    for (const { list, index } of this.#displays.get(displayIdOf(content) ?? "") ?? []) {
      const shown = list[index];
      if (shown?.output_type !== "display_data" && shown?.output_type !== "execute_result") continue;
      list[index] = { ...shown, data: record(content.data), metadata: record(content.metadata) };
    }
  }

  #clear(list: Output[]): void {
    list.length = 0;
    for (const [id, places] of this.#displays) {
      this.#displays.set(
        id,
        places.filter((place) => place.list !== list),
      );
    }
  }
}

function mergeStream(outputs: Output[], output: StreamOutput): boolean {
  const last = outputs.at(-1);
  if (last?.output_type !== "stream" || last.name !== output.name) return false;
  outputs[outputs.length - 1] = { ...last, text: last.text + output.text };
  return true;
}

function outputOf(type: string, content: Bundle): Output | undefined {
  switch (type) {
    case "stream":
      return { output_type: type, name: content.name === "stderr" ? "stderr" : "stdout", text: text(content.text) };
    case "display_data":
      return { output_type: type, data: record(content.data), metadata: record(content.metadata) };
    case "execute_result": {
      const count = typeof content.execution_count === "number" ? content.execution_count : null;
      return {
        output_type: type,
        execution_count: count,
        data: record(content.data),
        metadata: record(content.metadata),
      };
    }
    case "error":
      return {
        output_type: type,
        ename: text(content.ename),
        evalue: text(content.evalue),
        traceback: Array.isArray(content.traceback) ? content.traceback.map(text) : [],
      };
    default:
      return undefined;
  }
}

function displayIdOf(content: Bundle): string | undefined {
  const id = record(content.transient).display_id;
  return typeof id === "string" ? id : undefined;
}

function record(value: unknown): Bundle {
  return typeof value === "object" && value !== null && !Array.isArray(value) ? (value as Bundle) : {};
}

function text(value: unknown): string {
  return typeof value === "string" ? value : String(value ?? "");
}
