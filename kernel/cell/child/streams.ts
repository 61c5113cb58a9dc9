// process.stdout and process.stderr of the cells: what is written there is reported under the cell that wrote it.
import fs from "node:fs";
import { syncBuiltinESMExports } from "node:module";
import { StringDecoder } from "node:string_decoder";
import { currentOwner } from "./ownership.ts";
import type { Reporter } from "./report.ts";

/** Replaces the write functions of the two streams. */
export function captureStreams(reporter: Reporter): void {
  capture("stdout", reporter);
  capture("stderr", reporter);
  keepDescriptors();
}

/**
 * Closing descriptors 0 to 2 succeeds and closes nothing. Were one free, the next file that the runtime opens for itself (to read the size of the process,
 * say) would get it, and libuv ends the process when it closes such a number.
 */
function keepDescriptors(): void {
  const { closeSync, close } = fs;
  fs.closeSync = (fd) => {
    if (!isStandard(fd)) closeSync(fd);
  };
  fs.close = Object.assign((fd: number, callback?: fs.NoParamCallback) => {
    if (!isStandard(fd)) close(fd, callback);
    else if (callback) process.nextTick(callback, null);
  }, close);
  syncBuiltinESMExports();
}

function isStandard(fd: unknown): boolean {
  return fd === 0 || fd === 1 || fd === 2;
}

type Callback = (error?: Error | null) => void;

function capture(name: "stdout" | "stderr", reporter: Reporter): void {
  const decoder = new StringDecoder("utf8");
  const write = (chunk: unknown, encoding?: BufferEncoding | Callback, callback?: Callback): boolean => {
    const done = typeof encoding === "function" ? encoding : callback;
    const text =
      typeof chunk === "string"
        ? decoded(chunk, typeof encoding === "string" ? encoding : "utf8")
        : decoder.write(Buffer.from(chunk as Uint8Array));
    if (text.length > 0) reporter.stream(currentOwner().cell, name, text);
    if (done) process.nextTick(done);
    return true;
  };
  Object.defineProperty(process[name], "write", { value: write, writable: true, configurable: true });
}

/** A string given in another encoding (hex, base64) stands for bytes. */
function decoded(chunk: string, encoding: BufferEncoding): string {
  return encoding === "utf8" || encoding === "utf-8" ? chunk : Buffer.from(chunk, encoding).toString("utf8");
}
