import { fileURLToPath } from "node:url";
import { findStepper, type Stepper } from "@perigauge/steppers";
import { CellPool, type Choice, chooseStepper, readScenario, type Scenario } from "perigauge";
import { afterAll, expect, it } from "vitest";

/*
 * The scenarios that ship, each with its expected choice. The whole catalogue takes minutes, so each is run with the leaders that a run of
 * the whole catalogue ranked and their rivals of the other kind.
 */
const pool = new CellPool();
afterAll(() => pool.close());

async function choose(file: string, ids: readonly string[], change: Partial<Scenario> = {}): Promise<Choice> {
  const path = fileURLToPath(new URL(`../packages/harness/scenarios/${file}.json`, import.meta.url));
  const scenario = { ...(await readScenario(path)), ...change };
  const { choice } = await chooseStepper(scenario, {
    pool,
    steppers: ids.map((id) => findStepper(id) as Stepper),
    seed: 1,
    version: "test",
    command: "test",
    now: () => 0,
  });
  return choice;
}

it("constellation: a multistep stepper at the cap, its restarts charged", async () => {
  const choice = await choose("constellation", [
    "adams-bashforth-moulton-8",
    "gauss-jackson-8",
    "dormand-nystrom-6",
    "kahan-li-6",
  ]);
  expect(choice.choice).toBe("adams-bashforth-moulton-8");
  const [first, second] = choice.ranking;
  expect(first?.stepSeconds).toBe(30);
  expect(second?.stepper).toBe("gauss-jackson-8");
  // Twelve satellites, fourteen restarts each: the start-up of order 8 is cheaper than that of order 10.
  const perSatellite = (id: string): number => findStepper(id)?.startEvaluations ?? 0;
  const saved = 12 * 15 * (perSatellite("gauss-jackson-8") - perSatellite("adams-bashforth-moulton-8"));
  expect(saved).toBeGreaterThan(0);
  expect((second?.evaluationsTotal ?? 0) - (first?.evaluationsTotal ?? 0)).toBe(saved);
});

it("transfer: variable step of high order, a fraction of rk4's evaluations", async () => {
  const choice = await choose("transfer", [
    "dormand-nystrom-1210",
    "dormand-nystrom-86",
    "dormand-prince-54",
    "rk4",
    "kahan-li-8",
  ]);
  expect(choice.choice).toBe("dormand-nystrom-1210");
  expect(choice.current?.enough).toBe(true);
  expect(choice.current?.costAgainstChoice).toBeGreaterThan(50);
});

it("small moon: symplectic steppers overtake as the duration grows", async () => {
  const ids = ["blanes-moan-nystrom-6", "gauss-jackson-8"];
  const short = await choose("small-moon", ids, { duration: { orbits: 1000 } });
  const long = await choose("small-moon", ids, { duration: { orbits: 30000 } });
  const cost = ({ ranking }: Choice, id: string): number =>
    ranking.find(({ stepper }) => stepper === id)?.evaluationsPerOrbit ?? Number.POSITIVE_INFINITY;
  const [symplectic, other] = ids as [string, string];
  const advantage = (choice: Choice): number => cost(choice, other) / cost(choice, symplectic);
  expect(advantage(long)).toBeGreaterThan(1.1 * advantage(short));
});

it("binary star: timing at periastron and apsis, both bodies, over the first 400 orbits", async () => {
  const choice = await choose("binary-star", ["dormand-nystrom-12", "kahan-li-8", "leapfrog"], {
    duration: { orbits: 400 },
  });
  expect(choice.choice).toBe("dormand-nystrom-12");
  expect(choice.bodies?.lighterShare).toBeCloseTo(1 / 1.35, 12);
  expect(choice.bodies?.heavierShare).toBeCloseTo(0.35 / 1.35, 12);
  expect(choice.current?.enough).toBe(false);
});
