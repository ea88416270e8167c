import { mkdir, readFile, writeFile } from "node:fs/promises";
import { dirname } from "node:path";
import { fileURLToPath } from "node:url";
import {
  type Chart,
  type Choice,
  type ChoiceEvidence,
  describeCharts,
  describeChoice,
  scenarioJsonSchema,
  studyJsonSchema,
  toSvg,
} from "perigauge";

/*
 * Files in git that are generated. Without an option they are written; `--check` fails where one is out of date; `--record` first takes the
 * demo's charts and result from the last run of `choose`, in reports/results/latest.
 */
const root = fileURLToPath(new URL("..", import.meta.url));
const PICTURES = ["error-against-cost"] as const;

const generated: readonly { readonly path: string; readonly content: () => Promise<string> }[] = [
  {
    path: "packages/harness/schemas/scenario.schema.json",
    content: async () => `${JSON.stringify(scenarioJsonSchema(), null, 2)}\n`,
  },
  {
    path: "packages/harness/schemas/study.schema.json",
    content: async () => `${JSON.stringify(studyJsonSchema(), null, 2)}\n`,
  },
  ...PICTURES.map((name) => ({
    path: `reports/demo/${name}.svg`,
    content: async () => {
      const chart = JSON.parse(await readFile(`${root}reports/demo/${name}.json`, "utf8")) as Chart;
      return `${await toSvg(chart)}\n`;
    },
  })),
  {
    path: "README.md",
    content: async () => {
      const choice = JSON.parse(await readFile(`${root}reports/demo/result.json`, "utf8")) as Choice;
      const [shown] = describeChoice(choice, null).split(/\n(?=rank )/);
      const readme = await readFile(`${root}README.md`, "utf8");
      return readme.replace(
        /<!-- demo -->[\s\S]*<!-- \/demo -->/,
        () => `<!-- demo -->\n\`\`\`text\n${(shown ?? "").trim()}\n\`\`\`\n<!-- /demo -->`,
      );
    },
  },
];

if (process.argv.includes("--record")) await record();
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

async function record(): Promise<void> {
  const latest = `${root}reports/results/latest`;
  const evidence = JSON.parse(await readFile(`${latest}/evidence.json`, "utf8")) as ChoiceEvidence;
  const charts = describeCharts(evidence);
  await mkdir(`${root}reports/demo`, { recursive: true });
  await writeFile(`${root}reports/demo/result.json`, `${JSON.stringify(evidence.choice, null, 2)}\n`);
  for (const name of PICTURES) {
    const chart = charts.find((candidate) => candidate.name === name);
    if (chart === undefined) throw new Error(`the report has no chart ${name}`);
    await writeFile(`${root}reports/demo/${name}.json`, `${JSON.stringify(chart)}\n`);
  }
}
