import { mkdir, readFile, writeFile } from "node:fs/promises";
import { dirname } from "node:path";
import { fileURLToPath } from "node:url";
import { scenarioJsonSchema } from "perigauge";

/** Files in git that are generated from the source; `--check` fails where one is out of date instead of writing it. */
const generated: readonly { readonly path: string; readonly content: () => string | Promise<string> }[] = [
  {
    path: "packages/harness/schemas/scenario.schema.json",
    content: () => `${JSON.stringify(scenarioJsonSchema(), null, 2)}\n`,
  },
];

const root = fileURLToPath(new URL("..", import.meta.url));
const check = process.argv.includes("--check");
for (const { path, content } of generated) {
  const wanted = await content();
  const found = await readFile(root + path, "utf8").catch(() => "");
  if (found === wanted) continue;
  if (check) {
    process.stderr.write(`${path} is not what the source gives; run: npx -y pnpm@10.34.9 generate\n`);
    process.exitCode = 1;
  } else {
    await mkdir(dirname(root + path), { recursive: true });
    await writeFile(root + path, wanted);
    process.stdout.write(`wrote ${path}\n`);
  }
}
