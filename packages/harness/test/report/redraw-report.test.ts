import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { buildProgram } from "../../src/cli/program.ts";
import { runCommandLine } from "../../src/cli/run-command-line.ts";
import { writeChoiceFolder } from "../../src/output/choice-folder.ts";
import { inventedEvidence } from "./invented-evidence.ts";

let parent = "";
let directory = "";
let errors = "";

beforeEach(async () => {
  parent = await mkdtemp(join(tmpdir(), "redraw-"));
  directory = join(parent, "result");
  errors = "";
  vi.spyOn(process.stderr, "write").mockImplementation((text) => {
    errors += String(text);
    return true;
  });
  vi.spyOn(process.stdout, "write").mockReturnValue(true);
});
afterEach(async () => {
  vi.restoreAllMocks();
  await rm(parent, { recursive: true, force: true });
});

/** Every file below the folder, by its path. */
async function filesOf(folder: string): Promise<Map<string, Buffer>> {
  const entries = await readdir(folder, { recursive: true, withFileTypes: true });
  const files = new Map<string, Buffer>();
  for (const entry of entries.filter((one) => one.isFile())) {
    const path = join(entry.parentPath, entry.name);
    files.set(path, await readFile(path));
  }
  return files;
}

const report = (): Promise<number> => runCommandLine(buildProgram, ["report", directory]);

describe("a stored result drawn again", () => {
  it.each([true, false])("gives the same bytes (a stepper qualifies: %s)", async (qualifies) => {
    await writeChoiceFolder(directory, inventedEvidence({ qualifies }), []);
    const before = await filesOf(directory);
    await rm(join(directory, "report.html"));
    await writeFile(join(directory, "charts", "of-an-earlier-version.svg"), "<svg/>");
    expect(await report()).toBe(qualifies ? 0 : 1);
    const after = await filesOf(directory);
    expect([...after.keys()].sort()).toEqual([...before.keys()].sort());
    for (const [path, bytes] of before) expect(after.get(path)!.equals(bytes), path).toBe(true);
    expect(errors).toBe("");
  });

  it("with values that JSON cannot hold, too", async () => {
    const evidence = inventedEvidence();
    const [first, ...rest] = evidence.histories;
    const points = first!.points.map((point, i) => (i > 40 ? { ...point, phaseRad: Number.NaN } : point));
    await writeChoiceFolder(directory, { ...evidence, histories: [{ ...first!, points }, ...rest] }, []);
    const before = await readFile(join(directory, "report.html"));
    expect(await report()).toBe(0);
    expect((await readFile(join(directory, "report.html"))).equals(before)).toBe(true);
  });

  it("says in one line which field an older result lacks, and leaves the folder as it was", async () => {
    const evidence = inventedEvidence();
    await mkdir(directory);
    await writeFile(join(directory, "report.html"), "an earlier page");
    const older = JSON.stringify(evidence).replaceAll(/"uncertaintyFactor":1,/g, "");
    await writeFile(join(directory, "evidence.json"), older);
    expect(await report()).toBe(2);
    expect(errors.trimEnd().split("\n")).toHaveLength(1);
    expect(errors).toContain(
      "evidence.json.choice.ranking[0].errors.alongTrackKm.uncertaintyFactor: is missing",
    );
    expect(errors).toContain(`run it again with ${evidence.choice.provenance.command}`);
    expect(await readdir(directory)).toEqual(["evidence.json", "report.html"]);
    expect(await readFile(join(directory, "report.html"), "utf8")).toBe("an earlier page");
  });

  it.each([
    ["no evidence", null, "cannot be read (no such file)"],
    ["text that is not JSON", "{", "is not JSON"],
    ["something else", '{"format":"perigauge-sweep/1"}', "choice: is missing"],
  ])("refuses %s in one line", async (_, content, words) => {
    await mkdir(directory);
    if (content !== null) await writeFile(join(directory, "evidence.json"), content);
    expect(await report()).toBe(2);
    expect(errors.trimEnd().split("\n")).toHaveLength(1);
    expect(errors).toContain(words);
  });
});
