import { Bench } from "tinybench";

/** A time over several rounds: the median, and how far the rounds lie apart as a share of it. */
export interface Timing {
  readonly nanoseconds: number;
  readonly spread: number;
}

export const ROUNDS = 5;

/** One round of one contestant: nanoseconds per unit of work, the best of its short runs. */
export type Contestant = () => Promise<number> | number;

/**
 * Contestants take turns, round after round, so that what else the machine does falls on all of them; a round counts with the best of its
 * short runs, and the rounds with their median.
 */
export async function timed<Name extends string>(
  contestants: Readonly<Record<Name, Contestant>>,
): Promise<Readonly<Record<Name, Timing>>> {
  const names = Object.keys(contestants) as Name[];
  const times = new Map<Name, number[]>(names.map((name) => [name, []]));
  for (let round = 0; round < ROUNDS; round++) {
    for (const name of names) times.get(name)!.push(await contestants[name]());
  }
  return Object.fromEntries(names.map((name) => [name, summary(times.get(name)!)])) as Record<Name, Timing>;
}

function summary(times: readonly number[]): Timing {
  const sorted = times.toSorted((a, b) => a - b);
  const median = sorted[Math.floor(sorted.length / 2)]!;
  return { nanoseconds: median, spread: (sorted.at(-1)! - sorted[0]!) / median };
}

/** Long enough for the optimising compilers to finish. */
const WARM_UP_MILLISECONDS = 400;

/** A contestant in this process; `work` is how many units one call does. */
export function inProcess(work: number, run: () => void, milliseconds = 60): Contestant {
  let warm = false;
  return async () => {
    for (const from = performance.now(); !warm && performance.now() - from < WARM_UP_MILLISECONDS; ) run();
    warm = true;
    const bench = new Bench({ time: milliseconds, warmupTime: milliseconds / 2, iterations: 5 });
    bench.add("run", run);
    await bench.run();
    const result = bench.tasks[0]!.result;
    if (result.state !== "completed") throw new Error("a benchmark did not complete");
    return (result.latency.min * 1e6) / work;
  };
}

/** Processor time of this process so far, nanoseconds: for runs too long to escape what else the machine does. */
export function processorTime(): number {
  const { user, system } = process.cpuUsage();
  return 1000 * (user + system);
}
