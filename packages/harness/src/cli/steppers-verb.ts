import { catalogue, type StepperInfo } from "@perigauge/steppers";
import { Command } from "commander";
import { options } from "./options.ts";
import type { Outcome } from "./run-command-line.ts";
import { table } from "./table.ts";

/** `steppers`: the catalogue, as a table or as data. */
export function steppersVerb(_outcome: Outcome): Command {
  return new Command("steppers")
    .description("list the catalogue: order, stages, evaluations, properties, source")
    .addOption(options.json())
    .action((given: { readonly json?: true }) => {
      const entries = catalogue.map(describe);
      if (given.json) {
        process.stdout.write(
          `${JSON.stringify({ format: "perigauge-steppers/1", steppers: entries }, null, 2)}\n`,
        );
        return;
      }
      const yes = (value: boolean): string => (value ? "yes" : "no");
      const rows = entries.map((entry) => [
        entry.id,
        entry.family,
        String(entry.order),
        entry.stages === null ? "-" : String(entry.stages),
        entry.evaluationsPerStep === null ? "-" : String(entry.evaluationsPerStep),
        entry.knob,
        yes(entry.symplectic),
        yes(entry.timeReversible),
        entry.source,
      ]);
      process.stdout.write(
        `${table(["id", "family", "order", "stages", "evaluations a step", "knob", "symplectic", "reversible", "source"], rows)}\n`,
      );
    });
}

function describe(stepper: StepperInfo): StepperInfo {
  const { id, title, family, order, source, knob, uneven, symplectic, timeReversible, explicit } = stepper;
  const { selfStarting, denseOutput, stages, evaluationsPerStep, startEvaluations, note } = stepper;
  return {
    id,
    title,
    family,
    order,
    knob,
    uneven,
    symplectic,
    timeReversible,
    explicit,
    selfStarting,
    denseOutput,
    stages,
    evaluationsPerStep,
    startEvaluations,
    source,
    ...(note === undefined ? {} : { note }),
  };
}
