// Notebook files on disk. A file that exists is replaced whole or not touched: never truncated, never half written.
import { randomBytes } from "node:crypto";
import { chmod, open, readFile, realpath, rename, rm, stat } from "node:fs/promises";
import path from "node:path";
import { type Notebook, NotebookError } from "./format.ts";
import { parseNotebook } from "./parse.ts";
import { serialiseNotebook } from "./serialise.ts";

const REASONS: Readonly<Record<string, string>> = {
  ENOENT: "no such file",
  ENOTDIR: "no such file",
  EISDIR: "is a folder; expected a notebook file",
  EACCES: "permission denied",
  EPERM: "permission denied",
  EROFS: "the file system is read-only",
  ENOSPC: "no space left on the disk",
  EDQUOT: "no space left in the quota",
  EFBIG: "larger than files may be here",
};

/** Reads a notebook file. Throws NotebookError, also for a file that is missing or unreadable. */
export async function readNotebook(file: string): Promise<Notebook> {
  let text: string;
  try {
    text = await readFile(file, "utf8");
  } catch (error) {
    throw plainError(file, error);
  }
  return parseNotebook(text, file);
}

/** Writes a notebook file, atomically. */
export async function writeNotebook(file: string, notebook: Notebook): Promise<void> {
  await writeAtomically(file, serialiseNotebook(notebook));
}

/**
 * Writes a file through a temporary file in the same folder and a rename: a reader sees the old file or the new
 * one, and a failure (a full disk, no permission) leaves the old one as it was. A symbolic link stays a link.
 */
export async function writeAtomically(file: string, content: string | Uint8Array): Promise<void> {
  const target = await realpath(file).catch(() => path.resolve(file));
  const temporary = path.join(path.dirname(target), `.${path.basename(target)}.${randomBytes(6).toString("hex")}.part`);
  try {
    const mode = await stat(target).then(
      (existing) => existing.mode & 0o7777,
      () => undefined,
    );
    await writeNew(temporary, content);
    if (mode !== undefined) await chmod(temporary, mode);
    await rename(temporary, target);
  } catch (error) {
    await rm(temporary, { force: true }).catch(() => undefined);
    throw plainError(file, error);
  }
}

async function writeNew(file: string, content: string | Uint8Array): Promise<void> {
  const handle = await open(file, "wx");
  try {
    await handle.writeFile(content);
    await handle.sync();
  } finally {
    await handle.close();
  }
}

function plainError(file: string, error: unknown): NotebookError {
  const code = (error as NodeJS.ErrnoException).code ?? "";
  return new NotebookError(file, REASONS[code] ?? (error instanceof Error ? error.message : String(error)));
}
