import { Command } from "commander";
import { version } from "../version.ts";
import { chooseVerb } from "./choose-verb.ts";
import { convergeVerb } from "./converge-verb.ts";
import { exactVerb } from "./exact-verb.ts";
import { longRunVerb } from "./long-run-verb.ts";
import { reportVerb } from "./report-verb.ts";
import type { Outcome } from "./run-command-line.ts";
import { scoreVerb } from "./score-verb.ts";
import { steppersVerb } from "./steppers-verb.ts";
import { sweepVerb } from "./sweep-verb.ts";

/** The command line: one verb a file. */
export function buildProgram(outcome: Outcome): Command {
  const program = new Command("perigauge")
    .description("Choose an integrator and a step size for orbital motion, measured on the two-body problem.")
    .version(version)
    .exitOverride()
    .showSuggestionAfterError()
    .configureOutput({ outputError: (text, write) => write(`perigauge: ${oneLine(text)}\n`) })
    .addHelpText(
      "after",
      "\nExit codes: 0 every limit held; 1 a limit exceeded or none qualifies; 2 wrong input; 3 stopped.",
    );
  for (const verb of [
    chooseVerb,
    scoreVerb,
    sweepVerb,
    convergeVerb,
    longRunVerb,
    reportVerb,
    exactVerb,
    steppersVerb,
  ])
    program.addCommand(verb(outcome));
  for (const command of program.commands) command.copyInheritedSettings(program);
  return program;
}

function oneLine(text: string): string {
  return text
    .replace(/^error: /, "")
    .trim()
    .replaceAll(/\s*\n\s*/g, " ");
}
