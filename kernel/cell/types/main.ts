// Process "types", started without a snapshot: `node main.js FOLDER`.
import { fileURLToPath } from "node:url";
import { placesOf } from "./host.ts";
import { serve } from "./serve.ts";
import { NotebookTypes } from "./service.ts";

const root = fileURLToPath(new URL("../../../../", import.meta.url));
const types = new NotebookTypes(placesOf(root, process.argv[2] ?? process.cwd(), process.argv[3] === "confined"));
types.warm();
serve(types);
