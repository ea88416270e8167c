#!/usr/bin/env node
import { buildProgram } from "./program.ts";
import { runCommandLine } from "./run-command-line.ts";

process.exitCode = await runCommandLine(buildProgram, process.argv.slice(2));
