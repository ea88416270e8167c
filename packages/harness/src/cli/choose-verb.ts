import { Command } from "commander";
import { options } from "./options.ts";
import type { Outcome } from "./run-command-line.ts";
export function chooseVerb(_outcome: Outcome): Command {
  return new Command("choose").addOption(options.json());
}
