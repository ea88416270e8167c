import type { ChoiceEvidence } from "../evidence.ts";
import { type ColourName, colour } from "./palette.ts";

/** How one stepper is told from the others: colour, shape and dash. */
export interface StepperLook {
  readonly stepper: string;
  readonly colourName: ColourName;
  /** Outline in a square from -1 to 1, as a symbol of a chart and of the page's legend alike. */
  readonly shape: string;
  readonly dash: readonly number[];
}

export interface Looks {
  /** Drawn in colour, most telling first. */
  readonly highlighted: readonly StepperLook[];
  /** Drawn in grey behind. */
  readonly muted: readonly string[];
}

const DIAGONAL = 0.7;
const SHAPES: readonly string[] = [
  "M-0.9,0A0.9,0.9,0,1,1,0.9,0A0.9,0.9,0,1,1,-0.9,0Z",
  "M-0.8,-0.8H0.8V0.8H-0.8Z",
  "M0,-1L1,0.8H-1Z",
  "M0,-1.1L1,0L0,1.1L-1,0Z",
  "M-0.35,-1H0.35V-0.35H1V0.35H0.35V1H-0.35V0.35H-1V-0.35H-0.35Z",
  "M0,1L1,-0.8H-1Z",
  `M0,${-2 * 0.55}L${DIAGONAL},${-DIAGONAL * 0.2}L1,0.9L0,0.35L-1,0.9L${-DIAGONAL},${-DIAGONAL * 0.2}Z`,
  "M-1,-0.45H1V0.45H-1Z",
];
const DASHES: readonly (readonly number[])[] = [
  [1, 0],
  [7, 3],
  [2, 2],
  [9, 3, 2, 3],
  [12, 4],
  [4, 4],
  [9, 2, 2, 2, 2, 2],
  [1, 3],
];
const MOST = SHAPES.length;

/**
 * The choice, today's stepper, its rival and the next in the ranking get a look of their own, at most eight; where more steppers were
 * tried the rest stays grey. The same evidence gives the same looks.
 */
export function chooseLooks(evidence: ChoiceEvidence): Looks {
  const { choice } = evidence;
  const nearest = [...evidence.costPoints].sort((a, b) => a.worstRatio - b.worstRatio);
  const byImportance = [
    choice.choice,
    choice.current?.stepper,
    ...evidence.histories.map((history) => history.stepper),
    ...choice.ranking.map((ranked) => ranked.stepper),
    ...nearest.map((point) => point.stepper),
    ...evidence.survey.againstStep.map((point) => point.stepper),
    ...evidence.survey.againstEccentricity.map((point) => point.stepper),
  ];
  const ids = [...new Set(byImportance.filter((id) => typeof id === "string"))];
  return {
    highlighted: ids.slice(0, MOST).map((stepper, index) => ({
      stepper,
      colourName: `stepper${index}` as ColourName,
      shape: SHAPES[index] ?? "",
      dash: DASHES[index] ?? [],
    })),
    muted: ids.slice(MOST),
  };
}

/** Domain and ranges of the scales that carry the looks. */
export function lookScales(looks: readonly StepperLook[]): {
  readonly domain: string[];
  readonly colours: string[];
  readonly shapes: string[];
  readonly dashes: number[][];
} {
  return {
    domain: looks.map((look) => look.stepper),
    colours: looks.map((look) => colour(look.colourName)),
    shapes: looks.map((look) => look.shape),
    dashes: looks.map((look) => [...look.dash]),
  };
}
