import { execFile } from "node:child_process";
import { mkdtemp, readdir, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";

const main = fileURLToPath(new URL("../packages/harness/src/cli/main.ts", import.meta.url));

interface Result {
  readonly code: number;
  readonly stdout: string;
  readonly stderr: string;
}

function perigauge(...args: string[]): Promise<Result> {
  return new Promise((resolve) => {
    execFile(
      process.execPath,
      ["--import", "tsx", main, ...args],
      { cwd: fileURLToPath(new URL("..", import.meta.url)), maxBuffer: 2 ** 26 },
      (error, stdout, stderr) => resolve({ code: error === null ? 0 : Number(error.code), stdout, stderr }),
    );
  });
}

let folder: string;
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), "perigauge-test-"));
});
afterAll(async () => {
  await rm(folder, { recursive: true, force: true });
});

async function file(name: string, content: unknown): Promise<string> {
  const path = join(folder, name);
  await writeFile(path, typeof content === "string" ? content : JSON.stringify(content));
  return path;
}

const small = {
  format: "perigauge-scenario/1",
  title: "One orbit for tests",
  gravitationalParameterKm3S2: 398600.4418,
  orbits: [{ name: "one", semiMajorAxisKm: 12000, eccentricity: { from: 0.1, to: 0.15 } }],
  duration: { orbits: 20 },
  limits: [{ alongTrackKm: 0.5 }, { alongTrackKm: 0.2, withinDays: 0.5 }, { timingSeconds: 0.5 }],
  step: { multipleOfSeconds: 10 },
  current: { stepper: "leapfrog", stepSeconds: 10 },
  steppers: ["leapfrog", "rk4", "dormand-prince-5", "dormand-prince-54"],
};

describe("score", () => {
  it("prints one JSON document with every measure, and nothing else", async () => {
    const { code, stdout, stderr } = await perigauge(
      ..."score --stepper rk4 --eccentricity 0.5 --steps-per-orbit 400 --orbits 10 --json".split(" "),
    );
    expect(code).toBe(0);
    expect(stderr).toBe("");
    const score = JSON.parse(stdout);
    expect(score).toMatchObject({
      format: "perigauge-score/1",
      stepper: "rk4",
      eccentricity: 0.5,
      stepsPerOrbit: 400,
      tolerance: null,
      orbits: 10,
      startAnomalyDeg: 0,
      summation: "plain",
      step: 0.015707963267948967,
      steps: 4000,
      evaluations: 16000,
      ended: { status: "completed" },
    });
    for (const measure of ["energy", "angularMomentum", "phase", "period", "timing", "apsis", "position"]) {
      expect(Object.keys(score[measure])).toEqual(
        expect.arrayContaining(["max", "rms", "final", "driftPerOrbit", "growthExponent"]),
      );
    }
  });

  it("exits 1 where a limit is exceeded and 0 where it holds", async () => {
    const cell = "score --stepper rk4 --eccentricity 0.5 --steps-per-orbit 400".split(" ");
    const broken = await perigauge(...cell, "--limit", "phase.max=1e-9", "--limit", "energy=1");
    expect(broken.code).toBe(1);
    expect(broken.stderr).toMatch(/^perigauge: phase\.max is 7\.01e-5, limit 1\.00e-9\n$/);
    expect((await perigauge(...cell, "--limit", "phase.max=1e-3")).code).toBe(0);
  });

  it("scores a stepper of one's own beside the built-in ones: leapfrog written by hand gives leapfrog's bits", async () => {
    const own = await file(
      "own.mjs",
      `export const mine = { id: "my-leapfrog", step(q, v, h, acceleration) {
        const a = new Float64Array(q.length);
        for (let i = 0; i < q.length; i++) q[i] += 0.5 * h * v[i];
        acceleration(q, a);
        for (let i = 0; i < q.length; i++) { v[i] += h * a[i]; q[i] += 0.5 * h * v[i]; }
      } };`,
    );
    const cell = "--eccentricity 0.4 --steps-per-orbit 300 --orbits 5 --json".split(" ");
    const mine = JSON.parse(
      (await perigauge("score", "--stepper", "my-leapfrog", "--own", own, ...cell)).stdout,
    );
    const builtIn = JSON.parse((await perigauge("score", "--stepper", "leapfrog", ...cell)).stdout);
    expect(mine.evaluations).toBe(1500);
    // Same method, another order of additions: equal to rounding over 1,500 steps, u t sqrt(n) in phase.
    expect(Math.abs(mine.phase.max - builtIn.phase.max)).toBeLessThan(1e-11);
  });
});

describe("exact", () => {
  // Hull, Enright, Fellen & Sedgwick, SIAM J. Numer. Anal. 9, 603, 1972, problem D3 (e = 0.5, t = 20): end state computed from Kepler's
  // equation in 40 digits.
  it("gives the state of problem D3 to the last digits", async () => {
    const { stdout } = await perigauge(
      "exact",
      "--eccentricity",
      "0.5",
      "--periods",
      String(20 / (2 * Math.PI)),
      "--json",
    );
    const [state] = JSON.parse(stdout).states;
    const expected = [-0.5780432953035362, 0.8633840009194192, -0.9595083730380727, -0.0650491512671209];
    // The time is given in periods, rounded: 20 x 2^-53 of time moves the state by as much times its speed and acceleration.
    [state.x, state.y, state.vx, state.vy].forEach((value, i) => {
      expect(Math.abs(value - (expected[i] as number))).toBeLessThan(2 * 20 * 2 ** -53 + 2 ** -52);
    });
  });

  it("keeps every digit after 1e9 steps: k h is held exactly", async () => {
    const { stdout } = await perigauge(
      ..."exact --eccentricity 0 --steps-per-orbit 1000 --at-step 1000000000 --json".split(" "),
    );
    const [state] = JSON.parse(stdout).states;
    // 1e9 h - 1e6 x 2 pi in 60 digits, h the double nearest 2 pi/1000: computed with integers here.
    const h = (2 * Math.PI) / 1000;
    const scale = 10n ** 60n;
    const exactH = rational(h, scale);
    const twoPi = 6283185307179586476925286766559005768394338798750211641949889n * 10n ** 0n;
    const rest = Number(exactH * 10n ** 9n - (twoPi * scale * 10n ** 6n) / 10n ** 60n) / Number(scale);
    expect(Math.abs(state.meanAnomaly - rest)).toBeLessThan(1e-15);
    expect(Math.abs(state.trueAnomaly - rest)).toBeLessThan(1e-15);
  });
});

/** A double as an integer multiple of 1/scale, exactly rounded down. */
function rational(value: number, scale: bigint): bigint {
  const bits = new BigUint64Array(Float64Array.of(value).buffer)[0] as bigint;
  const exponent = Number((bits >> 52n) & 0x7ffn) - 1075;
  const mantissa = (bits & 0xfffffffffffffn) | 0x10000000000000n;
  return exponent >= 0
    ? mantissa * scale * 2n ** BigInt(exponent)
    : (mantissa * scale) / 2n ** BigInt(-exponent);
}

describe("steppers", () => {
  it("lists the catalogue as data, with sources", async () => {
    const { stdout } = await perigauge("steppers", "--json");
    const { steppers } = JSON.parse(stdout);
    const ids = steppers.map(({ id }: { id: string }) => id);
    expect(ids).toEqual(
      expect.arrayContaining([
        "explicit-euler",
        "symplectic-euler",
        "leapfrog",
        "velocity-verlet",
        "rk4",
        "dormand-prince-5",
        "dormand-prince-54",
      ]),
    );
    expect(new Set(ids).size).toBe(ids.length);
    for (const entry of steppers) expect(entry.source.length).toBeGreaterThan(10);
  });
});

describe("choose", () => {
  it("answers a scenario, writes the whole folder, and every worst cell re-runs to the same digits", async () => {
    const out = join(folder, "result");
    const { code, stdout } = await perigauge(
      "choose",
      await file("small.json", small),
      "--json",
      "--out",
      out,
    );
    expect(code).toBe(0);
    const choice = JSON.parse(stdout);
    expect(choice.format).toBe("perigauge-choice/1");
    expect(choice.choice).toBe(choice.ranking[0].stepper);
    expect(choice.current.enough).toBe(false);
    expect(await readdir(out)).toEqual(
      expect.arrayContaining(["result.json", "scores.ndjson", "scores.csv", "report.html", "charts"]),
    );
    expect(JSON.parse(await readFile(join(out, "result.json"), "utf8"))).toEqual(choice);
    const winner = choice.ranking[0];
    for (const [id, error] of Object.entries<{ command: string; value: number; factor: number }>(
      winner.errors,
    )) {
      expect(error.factor).toBeGreaterThanOrEqual(2);
      const again = await perigauge(...error.command.split(" ").slice(1), "--json");
      const score = JSON.parse(again.stdout);
      const a = 12000;
      const period = 2 * Math.PI * Math.sqrt(a ** 3 / 398600.4418);
      const value = id.startsWith("alongTrackKm") ? score.alongTrack.max * a : score.timing.max * period;
      // The same maximum; the period here is formed in another order of operations.
      expect(Math.abs(value / error.value - 1)).toBeLessThan(8 * 2 ** -53);
    }
    if (winner.stepSeconds !== null) expect(winner.stepSeconds % 10).toBe(0);
  });

  it("gives the same result for any number of workers", async () => {
    const path = await file("small.json", small);
    const [one, two] = await Promise.all(
      ["1", "2"].map((workers) => perigauge("choose", path, "--json", "--workers", workers)),
    );
    const strip = (text: string | undefined): unknown => ({ ...JSON.parse(text ?? ""), provenance: null });
    expect(strip(one?.stdout)).toEqual(strip(two?.stdout));
    expect(JSON.parse(one?.stdout ?? "").provenance.digest).toBe(
      JSON.parse(two?.stdout ?? "").provenance.digest,
    );
  });

  it("exits 1 and says what would have to give where nothing qualifies", async () => {
    const path = await file("hard.json", {
      ...small,
      require: { evaluationsPerOrbit: 100 },
      limits: [{ alongTrackKm: 1e-4 }],
    });
    const { code, stdout } = await perigauge("choose", path, "--json");
    expect(code).toBe(1);
    const choice = JSON.parse(stdout);
    expect(choice.choice).toBeNull();
    expect(choice.whatWouldHaveToGive.length).toBeGreaterThan(0);
    expect(choice.excluded.map(({ stepper }: { stepper: string }) => stepper).sort()).toEqual(
      [...small.steppers].sort(),
    );
    for (const { reason } of choice.excluded) expect(reason.length).toBeGreaterThan(20);
  });
});

describe("wrong input: exit code 2, one line, nothing written", () => {
  const cases: [string, () => Promise<string[]>, RegExp][] = [
    [
      "missing file",
      async () => ["choose", join(folder, "none.json")],
      /none\.json: cannot be read \(no such file\)/,
    ],
    [
      "broken JSON",
      async () => ["choose", await file("broken.json", '{ "format": ')],
      /broken\.json: is not JSON \(.*\)/,
    ],
    [
      "e = 1.2 in a scenario",
      async () => [
        "choose",
        await file("e.json", { ...small, orbits: [{ name: "x", semiMajorAxisKm: 9000, eccentricity: 1.2 }] }),
      ],
      /scenario\.orbits\[0\]\.eccentricity: must be less than 1, got 1\.2/,
    ],
    [
      "unknown stepper in a scenario",
      async () => ["choose", await file("s.json", { ...small, steppers: ["rk-4"] })],
      /unknown stepper "rk-4"; did you mean rk4\?/,
    ],
    [
      "e = 1.2",
      async () => "score --stepper rk4 --eccentricity 1.2 --steps-per-orbit 10".split(" "),
      /--eccentricity.*\[0, 1\).*1\.2/,
    ],
    [
      "negative step",
      async () => "score --stepper rk4 --eccentricity 0.1 --step -0.1".split(" "),
      /--step.*greater than 0.*-0\.1/,
    ],
    [
      "NaN",
      async () => "score --stepper rk4 --eccentricity NaN --steps-per-orbit 10".split(" "),
      /--eccentricity.*finite.*NaN/,
    ],
    [
      "unknown stepper",
      async () => "score --stepper leapfog --eccentricity 0.1 --steps-per-orbit 10".split(" "),
      /unknown stepper "leapfog"; did you mean leapfrog\?/,
    ],
    ["no step", async () => "score --stepper rk4 --eccentricity 0.1".split(" "), /give a step/],
    [
      "a tolerance for a fixed step",
      async () => "score --stepper rk4 --eccentricity 0.1 --tolerance 1e-9".split(" "),
      /rk4: takes a step, not a tolerance/,
    ],
    ["unknown verb", async () => ["chose"], /unknown command 'chose'.*choose/],
    ["unknown option", async () => ["steppers", "--jsn"], /unknown option '--jsn'.*--json/],
    [
      "bad limit",
      async () => "score --stepper rk4 --eccentricity 0.1 --steps-per-orbit 10 --limit phse=1".split(" "),
      /MEASURE\.SUMMARY=VALUE/,
    ],
    [
      "own module without a stepper",
      async () => [
        "score",
        "--stepper",
        "x",
        "--own",
        await file("empty.mjs", "export const x = 1;"),
        "--eccentricity",
        "0.1",
        "--steps-per-orbit",
        "9",
      ],
      /must export an object with an id/,
    ],
    [
      "exact without times",
      async () => "exact --eccentricity 0.1".split(" "),
      /exact: give either --periods/,
    ],
  ];
  it.each(cases)("%s", async (_, args, message) => {
    const out = join(folder, "must-not-exist");
    const list = await args();
    const { code, stdout, stderr } = await perigauge(
      ...list,
      ...(list[0] === "choose" ? ["--out", out] : []),
    );
    expect(stderr).toMatch(message);
    expect(stderr.trim().split("\n")).toHaveLength(1);
    expect(stderr.startsWith("perigauge: ")).toBe(true);
    expect(stdout).toBe("");
    expect(code).toBe(2);
    expect(await readdir(folder)).not.toContain("must-not-exist");
  });

  it("a folder that holds other things is refused before any work", async () => {
    const { code, stderr } = await perigauge("choose", await file("small.json", small), "--out", folder);
    expect(code).toBe(2);
    expect(stderr).toMatch(/holds something other than an earlier result/);
  });
});
