import { Command } from "commander";
import { type ObservedOrder, observeOrders } from "../analyse/observed-orders.ts";
import { ORDER_MEASURE_TITLES } from "../analyse/order-measures.ts";
import { InvalidInputError, mustBe } from "../errors.ts";
import { prepareFolder, writeResultFolder } from "../output/result-folder.ts";
import { CellPool } from "../run/cell-pool.ts";
import { loadOwnSteppers } from "../run/own-steppers.ts";
import type { Summation } from "../score/score.ts";
import { plain, scientific } from "../text/numbers.ts";
import { gridOptions, requireOption, requireSteppers } from "./grid-options.ts";
import { options } from "./options.ts";
import { startProgress } from "./progress.ts";
import type { Outcome } from "./run-command-line.ts";
import { table } from "./table.ts";

interface ConvergeOptions {
  readonly stepper?: readonly string[];
  readonly own: readonly string[];
  readonly eccentricity?: readonly number[];
  readonly stepsPerOrbit?: readonly number[];
  readonly tolerance?: readonly number[];
  readonly orbits: number;
  readonly start: number;
  readonly summation: Summation;
  readonly out?: string;
  readonly json?: true;
  readonly workers?: number;
  readonly quiet?: true;
}

/** `converge`: observed order of each measure, with its uncertainty. */
export function convergeVerb(_outcome: Outcome): Command {
  return new Command("converge")
    .description("observed order of accuracy of each measure, with its standard error, window and floor")
    .addOption(gridOptions.steppers())
    .addOption(options.own())
    .addOption(gridOptions.eccentricities())
    .addOption(gridOptions.stepsPerOrbit())
    .addOption(gridOptions.tolerances())
    .addOption(gridOptions.orbits(1))
    .addOption(options.start())
    .addOption(options.summation())
    .addOption(gridOptions.out())
    .addOption(options.json())
    .addOption(options.workers())
    .addOption(options.quiet())
    .action(async (given: ConvergeOptions) => {
      const own = await loadOwnSteppers(given.own);
      const steppers = requireSteppers(given.stepper, own);
      const eccentricities = requireOption("--eccentricity", given.eccentricity);
      if (!Number.isSafeInteger(given.orbits)) throw mustBe("--orbits", "a whole number", given.orbits);
      checkLadder("--steps-per-orbit", given.stepsPerOrbit);
      checkLadder("--tolerance", given.tolerance);
      if (given.out !== undefined) await prepareFolder(given.out);
      const progress = startProgress(given.quiet === true);
      const pool = new CellPool({
        ownFiles: given.own,
        onCells: progress.cells,
        ...(given.workers === undefined ? {} : { workers: given.workers }),
      });
      let found: Awaited<ReturnType<typeof observeOrders>>;
      try {
        progress.phase("ladders of steps", "");
        found = await observeOrders(
          {
            steppers,
            eccentricities,
            stepsPerOrbit: given.stepsPerOrbit ?? null,
            tolerances: given.tolerance ?? null,
            orbits: given.orbits,
            startAnomalyDeg: given.start,
            summation: given.summation,
          },
          pool,
        );
      } finally {
        progress.stop();
        await pool.close();
      }
      const { result, scores } = found;
      if (given.out !== undefined) await writeResultFolder(given.out, result, scores);
      process.stdout.write(
        given.json ? `${JSON.stringify(result, null, 2)}\n` : describe(result.orders, given.out),
      );
    });
}

/** @throws InvalidInputError where a ladder has too few rungs for any fit. */
function checkLadder(name: string, values: readonly number[] | undefined): void {
  if (values !== undefined && new Set(values).size < 5)
    throw new InvalidInputError(
      `${name}: an order takes at least five different values, got ${values.length}`,
    );
}

function describe(orders: readonly ObservedOrder[], folder: string | undefined): string {
  const rows = orders.map((entry) => [
    entry.stepper,
    String(entry.eccentricity),
    ORDER_MEASURE_TITLES[entry.measure],
    expected(entry),
    entry.order === null || entry.standardError === null
      ? "-"
      : `${entry.order.toFixed(2)} ± ${entry.standardError.toFixed(2)}`,
    entry.order === null ? "-" : String(entry.pointsFitted),
    entry.window === null ? "-" : `${plain(entry.window.from)} to ${plain(entry.window.to)}`,
    entry.floor === null ? "-" : `${scientific(entry.floor)} from ${plain(entry.floorFrom ?? 0)}`,
    entry.note ?? "",
  ]);
  const head = ["stepper", "e", "error", "expected", "order", "points", "steps per orbit", "floor", "note"];
  const remarks = [
    ...new Set(
      orders.flatMap(({ stepper, measure, explanation }) =>
        explanation === null ? [] : [`${stepper}, ${ORDER_MEASURE_TITLES[measure]}: ${explanation}`],
      ),
    ),
  ];
  const lines = [table(head, rows), "", ...remarks];
  if (folder !== undefined) lines.push(`Written to ${folder}`);
  return `${lines.join("\n").trimEnd()}\n`;
}

function expected({ expectedOrder, expectedRange }: ObservedOrder): string {
  if (expectedRange === null) return "-";
  const [from, to] = expectedRange;
  return from === to ? String(expectedOrder) : `${from} to ${to}`;
}
