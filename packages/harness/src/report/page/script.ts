/**
 * The page's own script: draws the compiled charts at the width they are given, shows tooltips, and lets the legend's buttons pick steppers in
 * every chart. Where it cannot run, the drawings made beforehand stay.
 */
export const pageScript: string = String.raw`
(() => {
  "use strict";
  const source = JSON.parse(document.getElementById("charts-data").textContent);
  const views = [];
  const picked = new Set();
  const tip = document.getElementById("tip");
  const raised = (text) => text.replace(/\d/g, (digit) => "⁰¹²³⁴⁵⁶⁷⁸⁹"[digit]).replace("-", "⁻").replace("+", "");

  // Charts hand numbers over as 1.234e-9; people read 1.234 × 10⁻⁹, and plain figures from 0.001 to 99,999.
  const readable = (text) => {
    const found = /^([-−]?\d(?:\.\d+)?)e([-−+]?\d+)$/.exec(text);
    if (!found) return text;
    const mantissa = found[1].replace("−", "-");
    const power = Number(found[2].replace("−", "-"));
    if (power >= -3 && power < 5) return String(Number(mantissa + "e" + power)).replace("-", "−");
    return String(Number(mantissa)).replace("-", "−") + " × 10" + raised(String(power));
  };

  const unpack = ({ rows, columns, texts }) =>
    Array.from({ length: rows }, (_, index) => {
      const row = {};
      for (const name in columns) row[name] = texts[name] ? texts[name][columns[name][index]] : columns[name][index];
      return row;
    });

  const fillTip = (value) => {
    const list = document.createElement("dl");
    for (const [name, text] of Object.entries(value)) {
      if (text === "" || text === null || text === "null" || text === "NaN") continue;
      const row = document.createElement("div");
      const term = document.createElement("dt");
      const words = document.createElement("dd");
      term.textContent = name;
      if (name === "command") {
        const code = document.createElement("code");
        code.textContent = text;
        words.append(code);
      } else words.textContent = readable(String(text));
      row.append(term, words);
      list.append(row);
    }
    tip.replaceChildren(list);
  };
  const placeTip = (event) => {
    const box = tip.getBoundingClientRect();
    const x = Math.min(event.clientX + 14, innerWidth - box.width - 8);
    const above = event.clientY + 14 + box.height > innerHeight;
    tip.style.left = Math.max(8, x) + "px";
    tip.style.top = Math.max(8, above ? event.clientY - box.height - 14 : event.clientY + 14) + "px";
  };
  const release = () => {
    tip.classList.remove("held");
    tip.hidden = true;
  };
  const showTip = (_handler, event, _item, value) => {
    if (tip.classList.contains("held")) return;
    tip.hidden = value === null || typeof value !== "object";
    if (tip.hidden) return;
    fillTip(value);
    placeTip(event);
  };
  // A click on a mark holds its tooltip, so that the command in it can be selected; Escape or a click elsewhere lets go.
  document.addEventListener("click", (event) => {
    if (tip.contains(event.target)) return;
    const wasHeld = tip.classList.contains("held");
    if (wasHeld) release();
    else if (!tip.hidden) tip.classList.add("held");
  });
  document.addEventListener("keydown", (event) => event.key === "Escape" && release());

  const applyPicks = (view) => {
    const tuples = [...picked].map((stepper) => ({ unit: "", fields: [{ type: "E", field: "stepper" }], values: [stepper] }));
    const empty = vega.changeset().remove(() => true);
    view.change("picked_store", tuples.length ? empty.insert(tuples) : empty).run();
  };
  const buttons = [...document.querySelectorAll("button.pick")];
  const all = document.querySelector("button.all");
  const picksChanged = () => {
    for (const button of buttons) button.setAttribute("aria-pressed", String(picked.has(button.dataset.stepper)));
    if (all) all.disabled = picked.size === 0;
    for (const { view, pickable } of views) if (pickable) applyPicks(view);
  };
  for (const button of buttons) {
    button.addEventListener("click", () => {
      const { stepper } = button.dataset;
      if (!picked.delete(stepper)) picked.add(stepper);
      picksChanged();
    });
  }
  all?.addEventListener("click", () => {
    picked.clear();
    picksChanged();
    buttons[0]?.focus();
  });

  const draw = async ({ name, spec }) => {
    const drawing = document.querySelector('[data-chart="' + name + '"]');
    for (const table of spec.data) if (typeof table.values === "number") table.values = unpack(source.tables[table.values]);
    const place = document.createElement("div");
    const view = new vega.View(vega.parse(spec), { renderer: "svg", hover: true, tooltip: showTip, logLevel: vega.Error });
    const input = document.querySelector('[data-input="' + name + '"]');
    // Inputs stand under the chart, not in it; Enter in one must not send the page anywhere.
    input?.addEventListener("submit", (event) => event.preventDefault());
    view.initialize(place, input).width(drawing.clientWidth);
    await view.runAsync();
    // The schema of specifications knows no step of a typed number; without one only whole numbers count as valid.
    for (const typed of input?.querySelectorAll("input[type=number]") ?? []) typed.step = "any";
    for (const attribute of ["role", "aria-roledescription", "aria-label"]) place.removeAttribute(attribute);
    place.setAttribute("aria-hidden", "true");
    drawing.replaceChildren(place);
    drawing.dataset.live = "";
    views.push({ view, pickable: spec.data.some((table) => table.name === "picked_store") });
    let width = drawing.clientWidth;
    new ResizeObserver(() => {
      if (drawing.clientWidth === width || drawing.clientWidth === 0) return;
      width = drawing.clientWidth;
      view.width(width).run();
    }).observe(drawing);
  };

  // Paper cannot be unfolded: print shows what is folded away.
  addEventListener("beforeprint", () => {
    for (const folded of document.querySelectorAll("details")) if (!folded.closest(".legend")) folded.open = true;
  });

  const drawAll = async () => {
    await document.fonts.ready;
    for (const chart of source.charts) {
      await draw(chart);
      await new Promise((resume) => setTimeout(resume));
    }
    for (const button of buttons) button.disabled = false;
    document.documentElement.dataset.drawn = String(views.length);
  };
  drawAll().catch((error) => {
    document.documentElement.dataset.drawn = "failed: " + error.message;
  });
})();
`;
