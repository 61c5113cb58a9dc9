#!/usr/bin/env node
// The command as npm links it: sets a fresh clone up, then hands over to the built command.
import { setUp } from "./setup.mjs";

setUp();
const { main } = await import("../../dist/kernel/cli.js");
process.exitCode = await main(process.argv.slice(2));
