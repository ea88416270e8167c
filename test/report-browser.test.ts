import { mkdtemp, readFile, rm } from "node:fs/promises";
import { createRequire } from "node:module";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { type Browser, chromium, type Page } from "playwright-core";
import { afterAll, afterEach, beforeAll, describe, expect, it } from "vitest";
import { describeCharts } from "../packages/harness/src/report/describe-charts.ts";
import { writeReport } from "../packages/harness/src/report/write-report.ts";
import { type Invention, inventedEvidence } from "../packages/harness/test/report/invented-evidence.ts";
import { CHROMIUM, CHROMIUM_FLAGS, chromiumMissing } from "./install-chromium.ts";

const require = createRequire(import.meta.url);

const REPORTS = {
  seven: { steppers: 7 },
  sixty: { steppers: 60 },
  none: { qualifies: false },
  hostile: { title: "</script><img src=x onerror=document.title='broken'>", id: "<b>'\"&bold" },
} as const satisfies Readonly<Record<string, Invention>>;
type Report = keyof typeof REPORTS;

// Without a browser there is nothing to test: said aloud, and a failure where tests must be complete.
const missing = chromiumMissing();
if (missing !== null && process.env.CI !== undefined) throw new Error(missing);
if (missing !== null) console.warn(`browser tests skipped: ${missing}`);

describe.skipIf(missing !== null)(`report in a browser${missing === null ? "" : ` (${missing})`}`, () => {
  let browser: Browser;
  let directory: string;
  let axe: string;
  const troubles: string[] = [];

  beforeAll(async () => {
    directory = await mkdtemp(join(tmpdir(), "report-browser-"));
    axe = await readFile(require.resolve("axe-core/axe.min.js"), "utf8");
    for (const [name, invention] of Object.entries(REPORTS)) {
      const own = await mkdtemp(join(directory, `${name}-`));
      await writeReport(own, inventedEvidence(invention));
      folders.set(name, own);
    }
    browser = await chromium.launch({ executablePath: CHROMIUM, args: [...CHROMIUM_FLAGS] });
  }, 120_000);
  const folders = new Map<string, string>();
  afterAll(async () => {
    await browser?.close();
    await rm(directory, { recursive: true, force: true });
  });
  afterEach(() => {
    troubles.length = 0;
  });

  async function open(
    report: Report,
    width: number,
    colorScheme: "light" | "dark" = "light",
    options: { readonly javaScriptEnabled?: boolean } = {},
  ): Promise<Page> {
    const context = await browser.newContext({ viewport: { width, height: 900 }, colorScheme, ...options });
    const page = await context.newPage();
    const address = pathToFileURL(join(folders.get(report) ?? "", "report.html")).href;
    page.on("console", (message) => troubles.push(`console ${message.type()}: ${message.text()}`));
    page.on("pageerror", (error) => troubles.push(`error: ${error.message}`));
    page.on("request", (request) => {
      if (request.url() !== address && !request.url().startsWith("data:"))
        troubles.push(`request: ${request.url()}`);
    });
    await page.goto(address);
    if (options.javaScriptEnabled !== false) {
      await page.waitForFunction("document.documentElement.dataset.drawn !== undefined", null, {
        timeout: 60_000,
      });
    }
    return page;
  }

  const reports = Object.keys(REPORTS) as Report[];

  it.each(reports)(
    "%s: every chart is drawn by the page's script, with no error and no request",
    async (report) => {
      const page = await open(report, 1280);
      const names = describeCharts(inventedEvidence(REPORTS[report])).map(({ name }) => name);
      expect(await page.evaluate("document.documentElement.dataset.drawn")).toBe(String(names.length));
      for (const name of names) {
        const drawing = page.locator(`[data-chart="${name}"][data-live]`);
        const marks = await drawing
          .locator("svg .mark-symbol path, svg .mark-rect path, svg .mark-line path")
          .count();
        expect(marks, name).toBeGreaterThan(2);
        const box = await drawing.locator("svg").boundingBox();
        expect(box?.width ?? 0, name).toBeGreaterThan(250);
        expect(box?.height ?? 0, name).toBeGreaterThan(100);
      }
      expect(troubles).toEqual([]);
      expect(await page.title()).not.toBe("broken");
      expect(await page.locator("img").count()).toBe(0);
      await page.context().close();
    },
  );

  it.each(reports)(
    "%s: nothing overflows, no label covers another and axe finds nothing, narrow and wide, light and dark",
    async (report) => {
      const page = await open(report, 390);
      await page.evaluate("document.querySelectorAll('details').forEach((one) => { one.open = true; })");
      await page.evaluate(axe);
      for (const width of [390, 1280]) {
        await page.setViewportSize({ width, height: 900 });
        await page.evaluate(nextFrames);
        expect(await page.evaluate("document.documentElement.scrollWidth")).toBe(width);
        expect(await page.evaluate(wideElements), `beyond the window at ${width}`).toEqual([]);
        expect(await page.evaluate(coveredLabels), `labels on labels at ${width}`).toEqual([]);
        for (const colorScheme of ["light", "dark"] as const) {
          await page.emulateMedia({ colorScheme });
          const found = violationsOf(await page.evaluate(axeRun));
          expect(found, `${width} px, ${colorScheme}`).toEqual([]);
        }
      }
      await page.context().close();
    },
  );

  it("dark and light use their own paper, in the page and in the charts", async () => {
    const colours = [];
    for (const scheme of ["light", "dark"] as const) {
      const page = await open("seven", 1280, scheme);
      colours.push(
        await page.evaluate(
          "[getComputedStyle(document.body).backgroundColor, getComputedStyle(document.querySelector('[data-chart=margins] svg')).backgroundColor]",
        ),
      );
      await page.context().close();
    }
    expect(colours[0]).not.toEqual(colours[1]);
    for (const pair of colours) expect((pair as string[])[0]).toBe((pair as string[])[1]);
  });

  it("the legend's buttons bring a stepper out in every chart, by keyboard too, and let go again", async () => {
    const page = await open("seven", 1280);
    const faded = `document.querySelectorAll('[data-chart="phase-against-steps"] .mark-symbol path[opacity="0.1"], [data-chart="error-against-cost"] .mark-symbol path[opacity="0.1"]').length`;
    expect(await page.evaluate(faded)).toBe(0);
    const button = page.locator('button[data-stepper="rk4"]');
    await button.focus();
    await page.keyboard.press("Enter");
    expect(await button.getAttribute("aria-pressed")).toBe("true");
    expect(await page.evaluate(faded)).toBeGreaterThan(20);
    const bright = await page.evaluate(
      `[...document.querySelectorAll('[data-chart="phase-against-steps"] .mark-symbol path:not([opacity="0.1"])')].map((mark) => mark.getAttribute("fill"))`,
    );
    expect(new Set(bright as string[])).toEqual(new Set(["var(--stepper1)"]));
    await page.locator("button.all").click();
    expect(await page.evaluate(faded)).toBe(0);
    expect(troubles).toEqual([]);
    await page.context().close();
  });

  it("the slider moves the curves to another eccentricity, and says which", async () => {
    const page = await open("seven", 1280);
    const drawing = '[data-chart="error-at-one-eccentricity"]';
    const marks = `[...document.querySelectorAll('${drawing} .mark-symbol path')].map((mark) => mark.getAttribute("transform")).join()`;
    const before = await page.evaluate(marks);
    expect(await page.locator(`${drawing} svg`).textContent()).toContain("e = 0.6");
    const slider = page.getByLabel("eccentricity");
    await slider.focus();
    await page.keyboard.press("ArrowLeft");
    await expect.poll(() => page.evaluate(marks)).not.toBe(before);
    expect(await page.locator(`${drawing} svg`).textContent()).toContain("e = 0.5");
    await page.keyboard.press("ArrowRight");
    await expect.poll(() => page.evaluate(marks)).toBe(before);
    expect(troubles).toEqual([]);
    await page.context().close();
  });

  it("another limit, typed, changes which steppers qualify and where the line lies", async () => {
    const page = await open("seven", 1280);
    const drawing = page.locator('[data-chart="error-against-cost"] svg');
    const rings = drawing.locator('.qualifying_rings path, .mark-symbol path[stroke="var(--limit)"]');
    const holding = async (): Promise<number> =>
      Number(
        /(\d+) steppers? holds? the limits|(\d+) steppers hold the limits/.exec(
          (await drawing.textContent()) ?? "",
        )?.[1],
      );
    const [steppers, ringed] = [await holding(), await rings.count()];
    expect(steppers).toBeGreaterThan(1);
    expect(ringed).toBe(steppers);
    const line = drawing.locator('.mark-rule line[stroke="var(--limit)"]').first();
    const level = await line.getAttribute("transform");
    const input = page.getByLabel("every limit of the scenario times");
    await input.fill("0.05");
    await expect.poll(() => rings.count()).toBeLessThan(ringed);
    expect(await holding()).toBe(await rings.count());
    expect(await line.getAttribute("transform")).not.toBe(level);
    // Enter stays on the page; what is no number counts as 1.
    await input.press("Enter");
    await input.fill("");
    await expect.poll(() => rings.count()).toBe(ringed);
    expect(await line.getAttribute("transform")).toBe(level);
    expect(troubles).toEqual([]);
    await page.context().close();
  });

  it("a grey stepper is brought out too", async () => {
    const page = await open("sixty", 1280);
    await page.locator(".legend summary").click();
    await page.locator(".legend details button.pick").first().click();
    const inked = await page.evaluate(
      `document.querySelectorAll('[data-chart="phase-against-steps"] .mark-line path[stroke="var(--ink)"]').length`,
    );
    expect(inked).toBe(1);
    await page.context().close();
  });

  it("a tooltip shows units and the command, stays when clicked, and goes with Escape", async () => {
    const page = await open("seven", 1280);
    const mark = page
      .locator('[data-chart="phase-against-steps"] .mark-symbol path[fill="var(--stepper0)"]')
      .nth(2);
    await mark.scrollIntoViewIfNeeded();
    await mark.hover();
    const tip = page.locator("#tip");
    await expect.poll(() => tip.isVisible()).toBe(true);
    const words = await tip.textContent();
    expect(words).toContain("phase error, rad");
    expect(words).toContain("perigauge score --stepper dormand-prince-54");
    expect(words).toMatch(/ × 10⁻/);
    expect(words).not.toMatch(/\de-\d/);
    await mark.click();
    await page.mouse.move(5, 5);
    expect(await tip.isVisible()).toBe(true);
    await page.keyboard.press("Escape");
    expect(await tip.isVisible()).toBe(false);
    await page.context().close();
  });

  it("every link and button is reached by keyboard, the way to the charts first", async () => {
    const page = await open("seven", 1280);
    const reached = new Set<string>();
    for (let press = 0; press < 80; press++) {
      await page.keyboard.press("Tab");
      const label = await page.evaluate("document.activeElement.textContent");
      if (press === 0) expect(label).toBe("Skip to the charts");
      reached.add(String(label));
    }
    const wanted = await page.evaluate(
      "[...document.querySelectorAll('a, button:not(:disabled), summary')].map((one) => one.textContent)",
    );
    expect([...reached]).toEqual(expect.arrayContaining(wanted as string[]));
    await page.context().close();
  });

  it("charts follow the width of the window", async () => {
    const page = await open("seven", 1280);
    const width = async (): Promise<number> =>
      (await page.locator('[data-chart="error-against-cost"] svg').boundingBox())?.width ?? 0;
    expect(await width()).toBeGreaterThan(900);
    await page.setViewportSize({ width: 390, height: 900 });
    await expect.poll(width).toBeLessThan(391);
    expect(await page.evaluate("document.documentElement.scrollWidth")).toBe(390);
    await page.context().close();
  });

  it("without scripts the drawings are there", async () => {
    const page = await open("seven", 1280, "light", { javaScriptEnabled: false });
    const names = describeCharts(inventedEvidence(REPORTS.seven)).map(({ name }) => name);
    expect(await page.locator(".drawing > div > svg").count()).toBe(names.length);
    await page.context().close();
  });

  it("in print the paper is light, in a dark scheme too", async () => {
    const page = await open("seven", 1280, "dark");
    await page.emulateMedia({ media: "print", colorScheme: "dark" });
    expect(await page.evaluate("getComputedStyle(document.body).backgroundColor")).toBe("rgb(252, 251, 248)");
    // 182 mm between margins of 14 mm: tables stay tables and nothing is cut off at the right.
    await page.setViewportSize({ width: 688, height: 900 });
    expect(await page.evaluate("getComputedStyle(document.querySelector('main td')).display")).toBe(
      "table-cell",
    );
    expect(await page.evaluate("document.documentElement.scrollWidth")).toBe(688);
    const pdf = await page.pdf({ format: "A4" });
    expect(pdf.subarray(0, 5).toString("latin1")).toBe("%PDF-");
    await page.context().close();
  });
});

/** Marks inside a chart are hidden from assistive technology, the chart itself being an image with words: thousands of nodes less to visit. */
const axeRun = "axe.run({ exclude: ['.drawing > [aria-hidden=true]'] })";

/** Charts are drawn anew in the frame after the window's width changes. */
const nextFrames =
  "new Promise((resume) => requestAnimationFrame(() => requestAnimationFrame(() => setTimeout(resume, 50))))";

/** Elements that reach beyond the window; those made invisible on purpose do not count. */
const wideElements = `[...document.querySelectorAll('main *')]
  .filter((one) => !one.closest('.unseen, thead, .skip, svg'))
  .map((one) => [one, one.getBoundingClientRect()])
  .filter(([, box]) => box.width > 0 && (box.right > innerWidth + 0.5 || box.left < -0.5))
  .map(([one, box]) => one.tagName + '.' + one.className + ' ' + box.left + ' to ' + box.right)`;

/** Pairs of texts in one chart that cover one another; a label is drawn twice where it has a halo. */
const coveredLabels = `[...document.querySelectorAll('.drawing')].flatMap((drawing) => {
  const texts = [...drawing.querySelectorAll('svg text')].filter((one) => one.textContent.trim() !== '' && one.textContent !== '×');
  const boxes = texts.map((one) => ({ text: one.textContent, box: one.getBoundingClientRect() })).filter(({ box }) => box.width > 0);
  const found = [];
  boxes.forEach((a, i) => boxes.slice(i + 1).forEach((b) => {
    const across = Math.min(a.box.right, b.box.right) - Math.max(a.box.left, b.box.left);
    const down = Math.min(a.box.bottom, b.box.bottom) - Math.max(a.box.top, b.box.top);
    if (a.text !== b.text && across > 1 && down > 4) found.push(drawing.dataset.chart + ': ' + a.text + ' | ' + b.text);
  }));
  return found;
})`;

interface AxeResult {
  readonly violations: readonly {
    readonly id: string;
    readonly nodes: readonly { readonly html: string; readonly failureSummary?: string }[];
  }[];
}

function violationsOf(found: unknown): string[] {
  return (found as AxeResult).violations.map(
    ({ id, nodes }) => `${id}: ${nodes[0]?.html.slice(0, 160)} ${nodes[0]?.failureSummary ?? ""}`,
  );
}
