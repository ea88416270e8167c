import { type Rational, toDouble } from "../exact/rational.ts";
import type { Published } from "../methods/method.ts";

/** What a stepper takes over from its method's data. */
export const published = ({ id, title, order, source, note }: Published): Published => ({
  id,
  title,
  order,
  source,
  ...(note === undefined ? {} : { note }),
});

/** Claims of the explicit methods that keep no geometry. */
export const notGeometric: {
  readonly symplectic: false;
  readonly timeReversible: false;
  readonly explicit: true;
} = { symplectic: false, timeReversible: false, explicit: true };

export const rounded = (rows: readonly (readonly Rational[])[]): number[][] =>
  rows.map((row) => row.map(toDouble));
