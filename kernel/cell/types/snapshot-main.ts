// Process "types", as a start-up snapshot: the compiler with library and node types parsed, for any notebook.
import { startupSnapshot } from "node:v8";
import { placesOf } from "./host.ts";
import { serve } from "./serve.ts";
import { NotebookTypes } from "./service.ts";

// The builder passes the root of the installation; the process that starts from the snapshot passes a folder.
const root = process.argv[2] ?? "";
const warmed = new NotebookTypes(placesOf(root, root));
warmed.warm();

startupSnapshot.setDeserializeMainFunction(() => {
  // The warmed one keeps the parsed files alive; files are shared by all notebooks of a process.
  warmed.reset();
  // Started from a snapshot, a process has no script among its arguments; it runs in the notebook's folder.
  serve(new NotebookTypes(placesOf(root, process.cwd(), process.argv.at(-1) === "confined")));
});
