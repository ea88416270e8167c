import type { Tableau } from "../method.ts";

export const explicitEuler: Tableau = {
  id: "explicit-euler",
  title: "Explicit Euler",
  order: 1,
  source: "L. Euler, Institutionum Calculi Integralis, vol. I (1768), sect. II ch. VII",
  a: [""],
  b: "1",
};
