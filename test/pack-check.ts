import { execFile } from "node:child_process";
import { mkdtemp, readdir, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { promisify } from "node:util";

/**
 * Packs the three packages as they would be published, installs them in an empty folder and runs the command line there on plain Node.
 * The packages must have been built.
 */
const run = promisify(execFile);
const root = fileURLToPath(new URL("..", import.meta.url));
const folder = await mkdtemp(join(tmpdir(), "perigauge-pack-"));
try {
  for (const name of ["kepler", "steppers", "harness"]) {
    await run("npx", ["-y", "pnpm@10.34.9", "pack", "--pack-destination", folder], {
      cwd: join(root, "packages", name),
    });
  }
  const tarballs = (await readdir(folder)).filter((file) => file.endsWith(".tgz")).map((file) => `./${file}`);
  await writeFile(join(folder, "package.json"), '{ "private": true }\n');
  await run("npm", ["install", "--no-audit", "--no-fund", "--no-package-lock", ...tarballs], { cwd: folder });
  const bin = join(folder, "node_modules", ".bin", "perigauge");
  const { stdout } = await run(
    bin,
    ["score", "--stepper", "rk4", "--eccentricity", "0.5", "--steps-per-orbit", "400", "--json"],
    { cwd: folder },
  );
  const score = JSON.parse(stdout) as { format: string; steps: number };
  if (score.format !== "perigauge-score/1" || score.steps !== 4000)
    throw new Error(`unexpected score: ${stdout}`);
  await writeFile(
    join(folder, "small.json"),
    JSON.stringify({
      format: "perigauge-scenario/1",
      title: "Packed",
      gravitationalParameterKm3S2: 398600.4418,
      orbits: [{ name: "one", semiMajorAxisKm: 10000, eccentricity: 0.1 }],
      start: "periapsis",
      duration: { orbits: 12 },
      limits: [{ alongTrackKm: 1 }],
      steppers: ["rk4", "leapfrog"],
    }),
  );
  const chosen = await run(bin, ["choose", "small.json", "--json", "--out", "result", "--workers", "2"], {
    cwd: folder,
  });
  if ((JSON.parse(chosen.stdout) as { choice: string | null }).choice === null)
    throw new Error("the packed choose found nothing");
  process.stdout.write(`packed, installed and run: ${tarballs.join(" ")}\n`);
} finally {
  await rm(folder, { recursive: true, force: true });
}
