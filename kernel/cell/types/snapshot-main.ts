// Process "types", as a start-up snapshot: the compiler with language and library parsed, for a notebook in any folder.
import { startupSnapshot } from "node:v8";
import { placesOf } from "./host.ts";
import { serve } from "./serve.ts";
import { NotebookTypes } from "./service.ts";

// The builder passes the root of the installation; the process that starts from the snapshot passes a folder.
const root = process.argv[2] ?? "";
const types = new NotebookTypes(placesOf(root, root), false);
types.warm();

startupSnapshot.setDeserializeMainFunction(() => {
  // Started from a snapshot, a process has no script among its arguments; it runs in the notebook's folder.
  types.move(placesOf(root, process.cwd(), process.argv.at(-1) === "confined"));
  serve(types);
});
