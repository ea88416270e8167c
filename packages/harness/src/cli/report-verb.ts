import { Command } from "commander";
import { redrawReport } from "../report/redraw-report.ts";
import { EXIT, type Outcome } from "./run-command-line.ts";

/** `report`: page and charts of a stored result, drawn again without running anything. */
export function reportVerb(outcome: Outcome): Command {
  return new Command("report")
    .description("draw the report of a stored result again, from its evidence.json, without computing")
    .argument("<dir>", "folder that choose --out wrote")
    .action(async (directory: string) => {
      const { choice } = await redrawReport(directory);
      process.stdout.write(`${directory}: report.html and charts drawn again\n`);
      if (choice.choice === null) outcome.exitCode = EXIT.exceeded;
    });
}
