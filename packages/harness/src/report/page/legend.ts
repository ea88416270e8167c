import type { Looks, StepperLook } from "../look/stepper-look.ts";
import { html, type Markup } from "../text/html.ts";
import { plural } from "../text/words.ts";

/** The steppers as buttons that bring them out in every chart at once; without scripts, the legend. */
export function legend(looks: Looks): Markup {
  return html`<div class="legend" role="group" aria-label="Steppers shown in the charts">
<span class="chips">${looks.highlighted.map((look) => button(look.stepper, swatch(look)))}<button type="button" class="all" disabled>show all</button></span>
${
  looks.muted.length === 0
    ? null
    : html`<details><summary>${plural(looks.muted.length, "more stepper")}, drawn in grey</summary><span class="chips">${looks.muted.map((stepper) => button(stepper, null))}</span></details>`
}</div>`;
}

function button(stepper: string, mark: Markup | null): Markup {
  return html`<button type="button" class="pick" aria-pressed="false" data-stepper="${stepper}" disabled>${mark}${stepper}</button>`;
}

function swatch(look: StepperLook): Markup {
  return html`<svg viewBox="-15 -6 30 12" width="30" height="12" aria-hidden="true"><path d="M-15,0H15" stroke="var(--${look.colourName})" stroke-width="1.8" stroke-dasharray="${look.dash.join(" ")}" fill="none"/><path d="${look.shape}" transform="scale(4.4)" fill="var(--${look.colourName})"/></svg>`;
}
