import { execFile } from "node:child_process";
import { mkdtemp, readdir, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { Ajv2020 } from "ajv/dist/2020.js";
import { buildProgram, runCommandLine, studyJsonSchema } from "perigauge";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";

const main = fileURLToPath(new URL("../packages/harness/src/cli/main.ts", import.meta.url));

interface Result {
  readonly code: number;
  readonly stdout: string;
  readonly stderr: string;
}

/** As a process of its own, with threads. */
function asProcess(line: string): Promise<Result> {
  return new Promise((resolve) => {
    execFile(
      process.execPath,
      ["--import", "tsx", main, ...line.split(" ")],
      { cwd: fileURLToPath(new URL("..", import.meta.url)), maxBuffer: 2 ** 26 },
      (error, stdout, stderr) => resolve({ code: error === null ? 0 : Number(error.code), stdout, stderr }),
    );
  });
}

/** In this process, which saves the start of another. */
async function perigauge(line: string): Promise<Result> {
  const written = { stdout: "", stderr: "" };
  const spies = (["stdout", "stderr"] as const).map((name) =>
    vi.spyOn(process[name], "write").mockImplementation((text) => {
      written[name] += String(text);
      return true;
    }),
  );
  try {
    const code = await runCommandLine(buildProgram, line.split(" "));
    return { code, ...written };
  } finally {
    for (const spy of spies) spy.mockRestore();
  }
}

let folder: string;
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), "perigauge-analyses-"));
});
afterAll(async () => {
  await rm(folder, { recursive: true, force: true });
});

async function file(name: string, content: unknown): Promise<string> {
  const path = join(folder, name);
  await writeFile(path, typeof content === "string" ? content : JSON.stringify(content));
  return path;
}

describe("converge", () => {
  it("prints one JSON document: orders with standard error, window, floor and points", async () => {
    const { code, stdout, stderr } = await perigauge(
      "converge --stepper rk4,yoshida-6 --eccentricity 0.3 --workers 1 --json",
    );
    expect([code, stderr]).toEqual([0, ""]);
    const result = JSON.parse(stdout);
    expect(result.format).toBe("perigauge-orders/1");
    expect(result.orders.length).toBe(14);
    const apsis = result.orders.find(
      (entry: { stepper: string; measure: string }) => entry.stepper === "rk4" && entry.measure === "apsis",
    );
    expect(apsis).toMatchObject({ eccentricity: 0.3, expectedOrder: 4, agrees: true });
    expect(Math.abs(apsis.order - 4)).toBeLessThan(0.1);
    expect(apsis.standardError).toBeLessThan(0.1);
    expect(apsis.window.to).toBeGreaterThan(apsis.window.from);
    expect(apsis.window.to).toBeLessThan(apsis.floorFrom);
    expect(apsis.floor).toBeLessThan(1e-12);
    expect(Object.keys(apsis.points[0])).toEqual(
      expect.arrayContaining(["stepsPerOrbit", "evaluationsPerOrbit", "error"]),
    );
  });

  it("takes a ladder and a stepper of one's own, and says so where there is no window", async () => {
    const own = await file(
      "own.mjs",
      `export const mine = { id: "my-euler", step(q, v, h, acceleration) {
        const a = new Float64Array(q.length);
        acceleration(q, a);
        for (let i = 0; i < q.length; i++) { v[i] += h * a[i]; q[i] += h * v[i]; }
      } };`,
    );
    const { code, stdout } = await perigauge(
      `converge --own ${own} --eccentricity 0.2 --steps-per-orbit 250:8000:6:log --out ${join(folder, "orders")} --workers 1`,
    );
    expect(code).toBe(0);
    expect(stdout).toMatch(/my-euler +0\.2 +energy, largest +- +1\.0\d ± 0\.\d\d +5 /);
    expect(stdout).toMatch(/energy, at whole orbits .*(3\.0|2\.9)\d ± /);
    expect((await readdir(join(folder, "orders"))).toSorted()).toEqual([
      "result.json",
      "scores.csv",
      "scores.ndjson",
    ]);
    const few = await perigauge(
      "converge --stepper rk4 --eccentricity 0.6 --steps-per-orbit 60:90:5 --workers 1",
    );
    expect(few.code).toBe(0);
    expect(few.stdout).toContain("no asymptotic window");
  });
});

describe("long-run", () => {
  it("tells a symplectic stepper from one that drifts", async () => {
    const { code, stdout, stderr } = await asProcess(
      "long-run --stepper leapfrog,rk4 --eccentricity 0.3 --steps-per-orbit 150.37 --orbits 256 --json",
    );
    expect([code, stderr]).toEqual([0, ""]);
    const result = JSON.parse(stdout);
    expect(result.format).toBe("perigauge-long-run/1");
    const [leapfrog, rk4] = result.runs;
    expect(leapfrog).toMatchObject({
      stepper: "leapfrog",
      orbits: 256,
      energyTrend: "bounded",
      atFloor: false,
    });
    expect(rk4).toMatchObject({ stepper: "rk4", energyTrend: "drifting" });
    expect(leapfrog.score.format).toBe("perigauge-score/1");
    expect(Math.abs(leapfrog.phaseGrowthExponent - 1)).toBeLessThan(0.05);
    expect(Math.abs(rk4.phaseGrowthExponent - 2)).toBeLessThan(0.15);
    expect(Object.keys(rk4.series[0])).toEqual(
      expect.arrayContaining(["orbit", "energy", "phase", "timing", "apsis"]),
    );
  });

  it("runs 10,000 orbits by default, exits 1 on a limit, and shows uncertainties", async () => {
    const { code, stdout, stderr } = await perigauge(
      "long-run --stepper leapfrog --eccentricity 0.1 --steps-per-orbit 20.37 --limit phase=1 --workers 1",
    );
    expect(code).toBe(1);
    expect(stderr).toMatch(
      /^perigauge: leapfrog, e = 0\.1, 20\.37 steps per orbit: phase\.max is \S+, limit 1\.00e0\n$/,
    );
    expect(stdout).toContain("10000 orbits");
    expect(stdout).toMatch(/bounded .* 0\.00 ± 0\.00 \(25\) .* 1\.00 ± 0\.00 \(25\) .* ± \S+ \(64\)/);
  });
});

describe("sweep", () => {
  const grid =
    "--stepper rk4,dormand-prince-54 --eccentricity 0:0.6:3 --steps-per-orbit 100,200 --tolerance 1e-6";

  it("writes NDJSON, CSV and the result whole, and shards add up to the grid", async () => {
    const out = join(folder, "sweep");
    const all = await asProcess(`sweep ${grid} --out ${out} --json`);
    expect([all.code, all.stderr]).toEqual([0, ""]);
    const result = JSON.parse(all.stdout);
    expect(result).toMatchObject({ format: "perigauge-sweep/1", shard: null, cells: 9 });
    expect(result.scores.length).toBe(9);
    expect(JSON.parse(await readFile(join(out, "result.json"), "utf8"))).toEqual(result);
    const lines = (await readFile(join(out, "scores.ndjson"), "utf8")).trimEnd().split("\n");
    expect(lines.map((line) => JSON.parse(line).stepper)).toEqual(
      result.scores.map(({ stepper }: { stepper: string }) => stepper),
    );
    const csv = (await readFile(join(out, "scores.csv"), "utf8")).trimEnd().split("\r\n");
    expect(csv.length).toBe(10);
    expect(csv[0]).toMatch(/^stepper,eccentricity,stepsPerOrbit,.*phase\.max/);
    const shards: { readonly scores: readonly unknown[] }[] = [];
    for (const i of [1, 2]) {
      const { stdout } = await perigauge(`sweep ${grid} --shard ${i}/2 --json --workers 1`);
      shards.push(JSON.parse(stdout));
    }
    const joined = Array.from({ length: 9 }, (_, i) => shards[i % 2]?.scores[Math.floor(i / 2)]);
    expect(joined).toEqual(result.scores);
  });

  it("takes a study file, which its schema accepts", async () => {
    const study = {
      format: "perigauge-study/1",
      title: "Starts and summations",
      steppers: ["velocity-verlet"],
      eccentricities: { from: 0.1, to: 0.5, count: 3 },
      stepsPerOrbit: { from: 50, to: 200, count: 3, spacing: "log" },
      orbits: 3,
      starts: ["periapsis", 90],
      summations: ["plain", "compensated"],
    };
    expect(new Ajv2020({ strict: true }).validate(studyJsonSchema(), study)).toBe(true);
    const { code, stdout } = await perigauge(`sweep ${await file("study.json", study)} --json --workers 1`);
    expect(code).toBe(0);
    const { scores } = JSON.parse(stdout);
    expect(scores.length).toBe(3 * 3 * 2 * 2);
    expect(scores[1]).toMatchObject({ eccentricity: 0.1, stepsPerOrbit: 100, orbits: 3, startAnomalyDeg: 0 });
  });

  it("exits 1 where a cell breaks a limit", async () => {
    const { code, stderr } = await perigauge(`sweep ${grid} --limit energy.max=1e-6 --workers 1`);
    expect(code).toBe(1);
    expect(stderr).toMatch(/^perigauge: rk4, e = 0, 100 steps per orbit: energy\.max is /);
  });
});

describe("wrong input: exit 2, one line, nothing written", () => {
  it.each([
    ["sweep --stepper rk4 --eccentricity 0:0.9:1 --steps-per-orbit 100", "FROM:TO:COUNT"],
    ["sweep --stepper rk4 --eccentricity 0.1,1.5 --steps-per-orbit 100", "[0, 1)"],
    ["sweep --stepper rk5 --eccentricity 0.1 --steps-per-orbit 100", "did you mean rk4"],
    ["sweep --stepper rk4,rk4 --eccentricity 0.1 --steps-per-orbit 100", "names a stepper twice"],
    ["sweep --stepper rk4 --eccentricity 0.1 --tolerance 1e-6", "takes steps per orbit"],
    ["sweep --stepper rk4 --steps-per-orbit 100", "--eccentricity: is missing"],
    ["sweep --stepper rk4 --eccentricity 0.1 --steps-per-orbit 100 --shard 3/2", "I/N"],
    ["sweep no-such-file.json", "no such file"],
    ["sweep package.json --stepper rk4", "is given by the study file"],
    ["converge --eccentricity 0.1", "name at least one"],
    ["converge --stepper rk4 --eccentricity 0.1 --orbits 1.5", "--orbits: must be a whole number, got 1.5"],
    ["converge --stepper rk4 --eccentricity 0.1 --steps-per-orbit 100,200", "at least five different values"],
    ["long-run --stepper leapfrog --eccentricity 0.1 --steps-per-orbit 0", "greater than 0"],
    ["long-run --stepper leapfrog --eccentricity 0.1 --steps-per-orbit 10 --orbits 1e99", "steps long"],
  ])("%s", async (line, expected) => {
    const { code, stdout, stderr } = await perigauge(`${line} --out ${join(folder, "nothing")}`);
    expect(code).toBe(2);
    expect(stdout).toBe("");
    expect(stderr.trimEnd().split("\n").length).toBe(1);
    expect(stderr).toContain(expected);
    expect((await readdir(folder)).includes("nothing")).toBe(false);
  });
});
