import { argv } from "node:process";
import { fileURLToPath } from "node:url";
import {
  ddOf,
  ddSolveKepler,
  orbitThrough,
  propagate,
  referenceTrack,
  solveKepler,
  stateAtTrueAnomalyDegrees,
} from "@perigauge/kepler";
import { Bench } from "tinybench";

/** Times of the exact solutions, and what they are compared with, of one run. */
export interface KeplerSpeed {
  /** Mean over the grid of one solution of Kepler's equation, ns. */
  readonly nsPerSolution: number;
  /** The same of a plain Newton iteration. */
  readonly nsPerNewton: number;
  /** Newton over own: 2 is twice as fast. */
  readonly fasterThanNewton: number;
  /** Slowest block of the grid over the mean. */
  readonly worstOverMean: number;
  /** Where that block is. */
  readonly worstBlock: string;
  /** Largest error over the grid, ulp of E: own and Newton's. */
  readonly worstUlps: number;
  readonly worstUlpsNewton: number;
  /** One point of a reference track in a batch, ns: the slowest of the eccentricities, which follow. */
  readonly nsPerTrackPoint: number;
  /** One orbit and its track, table built anew and table found, ms; memory of the table, kB: e = 0.9. */
  readonly msToBuildTrack: number;
  readonly msToFindTrack: number;
  readonly tableKilobytes: number;
  /** One propagation of any conic in double-double, ns. */
  readonly nsPerPropagation: number;
}

/** Rounds: what else runs on the machine seldom meets the same function in all of them. */
const rounds = 5;
/** Points a block of the grid. */
const blockSize = 128;
const eccentricities = [0, 0.05, 0.2, 0.4, 0.6, 0.8, 0.9, 0.97, 0.99, 0.999, 0.999999, 1 - 1e-12];
/** Bounds of the blocks in M; both signs alternate within a block. */
const meanBounds = [0, 1e-6, 1e-3, 0.03, 0.3, 1, 2, Math.PI];

/**
 * Plain Newton iteration with the usual starter M + 0.85 e sign(sin M) (Danby, Fundamentals of Celestial Mechanics, 2nd ed., section 6.6)
 * and the engine's sine and cosine, until a step is below 1e-14.
 */
function newton(e: number, mean: number): number {
  let anomaly = mean + (mean < 0 ? -0.85 : 0.85) * e;
  for (let k = 0; k < 60; k++) {
    const step = (anomaly - e * Math.sin(anomaly) - mean) / (1 - e * Math.cos(anomaly));
    anomaly -= step;
    if (Math.abs(step) < 1e-14) break;
  }
  return anomaly;
}

interface Block {
  readonly name: string;
  readonly e: Float64Array;
  readonly mean: Float64Array;
}

/** Points of one eccentricity and one range of M, spread by the golden ratio. */
function block(e: number, from: number, to: number): Block {
  const mean = new Float64Array(blockSize);
  for (let k = 0; k < blockSize; k++) {
    const share = ((k + 1) * 0.6180339887498949) % 1;
    mean[k] = (k % 2 === 0 ? 1 : -1) * (from + share * (to - from));
  }
  return {
    name: `e = ${e}, |M| in ${from} .. ${to.toPrecision(3)}`,
    e: new Float64Array(blockSize).fill(e),
    mean,
  };
}

/** Both blocks' points one after the other, in an order without pattern, as a sweep over unrelated orbits would. */
function mixed(blocks: readonly Block[]): Block {
  const count = blocks.length * blockSize;
  const e = new Float64Array(count);
  const mean = new Float64Array(count);
  for (let k = 0; k < count; k++) {
    const at = (k * 7919) % count;
    const from = blocks[Math.floor(at / blockSize)]!;
    e[k] = from.e[at % blockSize]!;
    mean[k] = from.mean[at % blockSize]!;
  }
  return { name: "grid", e, mean };
}

function solveAll(points: Block, solve: (e: number, mean: number) => number, out: Float64Array): () => void {
  const { e, mean } = points;
  const count = e.length;
  return () => {
    for (let k = 0; k < count; k++) out[k] = solve(e[k]!, mean[k]!);
  };
}

/** Least time of each function, ns: what else runs on the machine only adds to a time. */
async function leastTimes(functions: readonly (() => void)[], milliseconds: number): Promise<number[]> {
  const bench = new Bench({ time: milliseconds, warmupTime: milliseconds / 3 });
  functions.forEach((run, k) => {
    bench.add(String(k), run);
  });
  await bench.run();
  return bench.tasks.map(({ name, result }) => {
    if (result.state !== "completed") throw new Error(`benchmark ${name} did not complete`);
    return result.latency.min * 1e6;
  });
}

/** The same over several rounds in turn, with so many milliseconds for each function in all. */
async function leastOfRounds(functions: readonly (() => void)[], milliseconds: number): Promise<number[]> {
  const least = functions.map(() => Number.POSITIVE_INFINITY);
  for (let round = 0; round < rounds; round++) {
    const times = await leastTimes(functions, milliseconds / rounds);
    times.forEach((time, k) => {
      least[k] = Math.min(least[k]!, time);
    });
  }
  return least;
}

/** Largest error in ulp of E against the solution in double-double. */
function worstUlps(points: Block, solve: (e: number, mean: number) => number): number {
  let worst = 0;
  for (let k = 0; k < points.e.length; k++) {
    const exact = ddSolveKepler(ddOf(points.e[k]!), ddOf(points.mean[k]!));
    const value = solve(points.e[k]!, points.mean[k]!);
    const ulp = 2 ** (Math.floor(Math.log2(Math.abs(exact.hi))) - 52);
    worst = Math.max(worst, Math.abs(value - exact.hi - exact.lo) / ulp);
  }
  return worst;
}

/** Slowest time of a batch of track points over eccentricities, at a step that is no fraction of the period; ns a point. */
async function trackTime(milliseconds: number): Promise<number> {
  const count = 4096;
  const rows = new Float64Array(4 * count);
  const runs = [0, 0.3, 0.9, 0.999].map((e) => {
    const track = referenceTrack(orbitThrough(stateAtTrueAnomalyDegrees(e, 40)));
    return () => track.statesAtSteps(1_000_000, count, (2 * Math.PI) / 217.3, rows);
  });
  return Math.max(...(await leastTimes(runs, milliseconds))) / count;
}

/** Time of one orbit and its track, ms, with an eccentricity of its own each time (building) or always the same. */
function trackBuildTimes(): { readonly build: number; readonly find: number; readonly kilobytes: number } {
  const repeats = 60;
  let bytes = 0;
  const measure = (eccentricityOf: (k: number) => number): number => {
    const times: number[] = [];
    for (let k = 0; k < repeats; k++) {
      const state = stateAtTrueAnomalyDegrees(eccentricityOf(k), 40);
      const from = performance.now();
      const track = referenceTrack(orbitThrough(state));
      times.push(performance.now() - from);
      bytes = track.constants.rows.byteLength;
    }
    return times.sort((a, b) => a - b)[repeats / 2]!;
  };
  const build = measure((k) => 0.9 + k * 1e-7);
  return { build, find: measure(() => 0.9), kilobytes: bytes / 1000 };
}

/** Measures the exact solutions against a plain Newton iteration, in one run of about `seconds`. */
export async function keplerBench(seconds = 8): Promise<KeplerSpeed> {
  const blocks = eccentricities.flatMap((e) =>
    meanBounds.slice(1).map((to, k) => block(e, meanBounds[k]!, to)),
  );
  const grid = mixed(blocks);
  const out = new Float64Array(grid.e.length);
  const share = (seconds * 1000) / 4;
  // Both are met with every kind of point before they are timed.
  solveAll(grid, solveKepler, out)();
  solveAll(grid, newton, out)();
  const [own, plain] = (await leastOfRounds(
    [solveAll(grid, solveKepler, out), solveAll(grid, newton, out)],
    share,
  )) as [number, number];
  const blockTimes = await leastOfRounds(
    blocks.map((points) => solveAll(points, solveKepler, out)),
    share / blocks.length,
  );
  const slowest = blockTimes.indexOf(Math.max(...blockTimes));
  const nsPerSolution = own / grid.e.length;
  const start = { position: [1, 0, 0.1], velocity: [0, 1.3, 0.2] };
  const [propagation] = await leastTimes([() => propagate(start, 7.3)], share / 4);
  const tables = trackBuildTimes();
  return {
    nsPerSolution,
    nsPerNewton: plain / grid.e.length,
    fasterThanNewton: plain / own,
    worstOverMean: blockTimes[slowest]! / blockSize / nsPerSolution,
    worstBlock: blocks[slowest]!.name,
    worstUlps: worstUlps(grid, solveKepler),
    worstUlpsNewton: worstUlps(grid, newton),
    nsPerTrackPoint: await trackTime(share / 6),
    msToBuildTrack: tables.build,
    msToFindTrack: tables.find,
    tableKilobytes: tables.kilobytes,
    nsPerPropagation: propagation!,
  };
}

if (argv[1] === fileURLToPath(import.meta.url)) {
  const speed = await keplerBench();
  const fixed = (x: number, digits: number): string => x.toFixed(digits);
  console.log(
    [
      `Kepler's equation, grid of ${eccentricities.length * (meanBounds.length - 1) * blockSize} points in (e, M)`,
      `  own      ${fixed(speed.nsPerSolution, 1)} ns, at most ${fixed(speed.worstUlps, 2)} ulp`,
      `  Newton   ${fixed(speed.nsPerNewton, 1)} ns, at most ${speed.worstUlpsNewton.toPrecision(3)} ulp`,
      `  ratio    ${fixed(speed.fasterThanNewton, 2)} times faster than Newton`,
      `  worst    ${fixed(speed.worstOverMean, 2)} of the mean, at ${speed.worstBlock}`,
      `Reference track: ${fixed(speed.nsPerTrackPoint, 1)} ns a point`,
      `  table    ${fixed(speed.msToBuildTrack, 2)} ms to build, ${fixed(speed.msToFindTrack, 3)} ms to find, ` +
        `${fixed(speed.tableKilobytes, 0)} kB at e = 0.9`,
      `Propagation of any conic: ${fixed(speed.nsPerPropagation / 1000, 1)} us`,
    ].join("\n"),
  );
}
