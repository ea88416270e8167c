import {
  buildCollocation,
  type CollocationRows,
  gaussRows,
  inDoubles,
  radauRows,
} from "../build/collocation.ts";
import { parseRow } from "../exact/coefficients.ts";
import type { Collocation } from "../methods/method.ts";
import { type ImplicitStepper, implicitStep, variableCollocation } from "../run/implicit.ts";
import type { CollocationInDoubles } from "../run/radau.ts";
import { notGeometric, published } from "./claims.ts";

/** Gauss collocation, solved by fixed-point iteration. */
export function fromGauss(method: Collocation): ImplicitStepper {
  const claims = { ...published(method), family: "implicit-symplectic", explicit: false } as const;
  let rows: CollocationRows | undefined;
  return implicitStep(
    { ...claims, symplectic: true, timeReversible: true, stages: () => parseRow(method.nodes).length },
    (setting) => {
      rows ??= gaussRows(method);
      return buildCollocation(rows, setting);
    },
  );
}

/** Everhart's collocation in variable step. */
export function fromRadau(method: Collocation): ImplicitStepper {
  const claims = { ...published(method), ...notGeometric, family: "collocation", explicit: false } as const;
  let rows: CollocationRows | undefined;
  let numbers: CollocationInDoubles | undefined;
  return variableCollocation(
    { ...claims, stages: () => parseRow(method.nodes).length },
    (setting) => {
      rows ??= radauRows(method);
      return buildCollocation(rows, setting);
    },
    () => {
      numbers ??= inDoubles(method);
      return numbers;
    },
  );
}
