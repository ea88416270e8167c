import { mkdtemp, readdir, readFile, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { describeCharts } from "../../src/report/describe-charts.ts";
import type { ChoiceEvidence } from "../../src/report/evidence.ts";
import { renderPage } from "../../src/report/page/render-page.ts";
import { writeReport } from "../../src/report/write-report.ts";
import { inventedEvidence } from "./invented-evidence.ts";

const HOSTILE = "</script><img src=x onerror=alert(1)>&\"'<!--";

function pageOf(evidence: ChoiceEvidence): string {
  return renderPage(evidence, describeCharts(evidence));
}

/** The page without its scripts, runtime and style: what a reader gets. */
function bodyOf(page: string): string {
  return page.slice(page.indexOf("<body>"), page.indexOf('<script type="application/json"'));
}

describe("page of a choice", () => {
  const page = pageOf(inventedEvidence());
  const body = bodyOf(page);

  it("leads with the choice, then answers in order", () => {
    const order = [
      "<h1>",
      'id="today"',
      'id="compliance"',
      'id="ranking"',
      'id="excluded"',
      'id="charts"',
      'id="method"',
      'id="cautions"',
      'id="provenance"',
    ];
    const places = order.map((mark) => body.indexOf(mark));
    expect(places.every((place) => place > 0)).toBe(true);
    expect(places).toEqual([...places].sort((a, b) => a - b));
    expect(body).toMatch(/<h1>Use <b>.*dormand-prince-54.*<\/b> with tolerance/);
  });

  it("says of each requirement its limit, result, factor and the command of the worst case", () => {
    const { choice } = inventedEvidence();
    const start = body.indexOf('id="compliance"');
    const table = body.slice(start, body.indexOf("</table>", start));
    const text = table.replace(/<[^>]+>/g, "");
    for (const error of Object.values(choice.ranking[0]!.errors)) expect(text).toContain(error.command);
    expect(text).toContain("position along the track, first 7 days");
    expect(table.match(/✓/g)).toHaveLength(Object.keys(choice.ranking[0]!.errors).length);
  });

  it("gives every caution, reason and mark of provenance", () => {
    const { choice } = inventedEvidence();
    for (const caution of choice.cautions) expect(body).toContain(caution);
    for (const { reason } of choice.excluded) expect(body).toContain(reason);
    expect(body).toContain(choice.provenance.digest);
    expect(body).toContain(String(choice.provenance.seed));
  });

  it("says limits and requirements in words, and how far an extrapolated error may go", () => {
    const evidence = inventedEvidence();
    const { choice } = evidence;
    const [first, second, ...rest] = choice.ranking;
    const errors = Object.fromEntries(
      Object.entries(second!.errors).map(([key, error]) => [key, { ...error, uncertaintyFactor: 37 }]),
    );
    const ranking = [
      { ...first!, why: "fewest evaluations, bound by timingSeconds" },
      { ...second!, evidence: "extrapolated" as const, errors, why: "bound by alongTrackKm@7" },
      ...rest,
    ];
    const excluded = [
      {
        ...choice.excluded[0]!,
        reason: "holds at no step: semiMajorAxisM is 1.36e8, 2,930 times the 0.5 allowed",
      },
      {
        ...choice.excluded[0]!,
        stepper: "other",
        reason: "does not take a fixed step, and fixedStep is required",
      },
    ];
    const text = bodyOf(pageOf({ ...evidence, choice: { ...choice, ranking, excluded } }));
    expect(text).toContain("bound by time of periapsis passage");
    expect(text).toContain("bound by position along the track, first 7 days");
    expect(text).toContain("semi-major axis is 1.36\u00a0×\u00a010⁸\u00a0m, 2,930 times");
    expect(text).toContain("and a fixed step is required");
    expect(text).toContain("errors up to 37 times larger");
    expect(text).not.toMatch(/\b(?:timingSeconds|alongTrackKm|semiMajorAxisM|fixedStep)\b/);
  });

  it("says what a changed case would take and what the production code should show", () => {
    const text = body.replace(/<[^>]+>/g, "");
    expect(text).toContain("limits 10 times tighter");
    expect(text).toContain("none qualifies");
    expect(text).toContain("part by at most 0.0321 km");
    expect(text).toContain("the heavier body takes 0.333");
  });

  it("asks the browser for nothing: policy closed, no address but names of schemas", () => {
    expect(page).toContain("default-src 'none'");
    expect(body).not.toMatch(/https?:/);
    expect(page).not.toMatch(/<(?:script|img|iframe)[^>]+src=/);
    expect(page).not.toMatch(/<link[^>]+href="(?!data:)/);
    expect(page).not.toContain("sourceMappingURL");
  });

  it("is the same for the same evidence", () => {
    expect(pageOf(inventedEvidence())).toBe(page);
  });

  it("leads with what would have to give where nothing qualifies", () => {
    const none = inventedEvidence({ qualifies: false });
    const text = bodyOf(pageOf(none));
    expect(text).toContain("<h1>No stepper qualifies</h1>");
    expect(text.indexOf(none.choice.whatWouldHaveToGive[0]!)).toBeLessThan(text.indexOf('id="today"'));
    expect(text).not.toContain('id="compliance"');
  });

  it("shows a run that diverged as such, not as a number", () => {
    const evidence = inventedEvidence();
    const { current } = evidence.choice;
    const errors = Object.fromEntries(
      Object.entries(current!.errors).map(([key, error]) => [key, { ...error, value: null, factor: 0 }]),
    );
    const diverged: ChoiceEvidence = {
      ...evidence,
      choice: { ...evidence.choice, current: { ...current!, errors, margin: 0 } },
    };
    const text = bodyOf(pageOf(diverged));
    expect(text).toContain("diverged or not defined");
    expect(text).not.toMatch(/NaN|Infinity|undefined/);
  });

  it("lets no text of the scenario become markup", () => {
    const evidence = inventedEvidence({ title: HOSTILE, id: HOSTILE });
    const hostile = pageOf(evidence);
    expect(hostile).not.toContain("<img");
    expect(hostile.match(/<\/script>/g)).toHaveLength(3);
    expect(hostile.match(/<script/g)).toHaveLength(3);
    const data = /<script type="application\/json" id="charts-data">(.*?)<\/script>/s.exec(hostile)![1]!;
    expect(data).not.toContain("<");
    expect(JSON.stringify(JSON.parse(data))).toContain("onerror");
  });
});

describe("report folder", () => {
  let directory = "";
  beforeAll(async () => {
    directory = await mkdtemp(join(tmpdir(), "report-"));
  });
  afterAll(() => rm(directory, { recursive: true, force: true }));

  it("holds the page and each chart three times, for 73 steppers within 3 MB and 10 s of processor time", async () => {
    const evidence = inventedEvidence({ steppers: 73 });
    const start = process.cpuUsage();
    await writeReport(directory, evidence, { "extra.csv": "a,b\n" });
    // Processor time of all threads: what else the machine does is not counted.
    const { user, system } = process.cpuUsage(start);
    const seconds = (user + system) / 1e6;
    expect(seconds).toBeLessThan(10);
    const page = await readFile(join(directory, "report.html"));
    expect(page.length).toBeLessThan(3e6);
    expect(await readFile(join(directory, "extra.csv"), "utf8")).toBe("a,b\n");
    const names = describeCharts(evidence).flatMap(({ name }) => [
      `${name}.png`,
      `${name}.svg`,
      `${name}.vl.json`,
    ]);
    expect((await readdir(join(directory, "charts"))).sort()).toEqual(names.sort());
    for (const name of names.filter((candidate) => candidate.endsWith(".png"))) {
      const picture = await readFile(join(directory, "charts", name));
      expect(picture.subarray(1, 4).toString("latin1"), name).toBe("PNG");
      // Width in the header chunk (PNG specification, 11.2.2): 780 units at two pixels each.
      expect(picture.readUInt32BE(16), name).toBe(1560);
    }
  });
});
