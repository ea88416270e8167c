import type { Published } from "../method.ts";

export const hermite4: Published = {
  id: "hermite-4",
  title: "Hermite 4, predict–evaluate–correct",
  order: 4,
  source: "J. Makino, S.J. Aarseth, PASJ 44 (1992) 141-151",
  note: "One evaluation gives acceleration and jerk; a supplied acceleration needs its jerk too.",
};
