import { InvalidInputError as InvalidOrbit } from "@perigauge/kepler";
import { InvalidInputError as InvalidStep } from "@perigauge/steppers";
import { type Command, CommanderError } from "commander";
import { InvalidInputError } from "../errors.ts";

/** Exit codes of the command line. */
export const EXIT = { held: 0, exceeded: 1, wrongInput: 2, stopped: 3 } as const;
export type ExitCode = (typeof EXIT)[keyof typeof EXIT];

/** Where a verb leaves its exit code. */
export interface Outcome {
  exitCode: ExitCode;
}

/**
 * Parses and runs one command line; wrong input becomes one line on stderr and exit code 2, and nothing else is caught: a fault of the
 * program keeps its stack.
 */
export async function runCommandLine(
  build: (outcome: Outcome) => Command,
  argv: readonly string[],
): Promise<ExitCode> {
  const outcome: Outcome = { exitCode: EXIT.held };
  try {
    await build(outcome).parseAsync([...argv], { from: "user" });
  } catch (error) {
    if (error instanceof CommanderError) {
      // Help and version are not errors; the rest was printed by commander in one line.
      return error.exitCode === 0 ? EXIT.held : EXIT.wrongInput;
    }
    if (isWrongInput(error)) {
      process.stderr.write(`perigauge: ${error.message.replaceAll(/\s*\n\s*/g, " ")}\n`);
      return EXIT.wrongInput;
    }
    throw error;
  }
  return outcome.exitCode;
}

function isWrongInput(error: unknown): error is Error {
  return error instanceof InvalidInputError || error instanceof InvalidOrbit || error instanceof InvalidStep;
}
