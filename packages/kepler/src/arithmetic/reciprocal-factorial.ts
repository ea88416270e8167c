import { type DoubleDouble, ddDivide, ddOf } from "./double-double.ts";

const table: readonly DoubleDouble[] = build();

function build(): DoubleDouble[] {
  const list: DoubleDouble[] = [ddOf(1)];
  for (let n = 1; n < 32; n++) list.push(ddDivide(list[n - 1]!, ddOf(n)));
  return list;
}

/** 1/n! for n = 0 .. 31, relative error at most n 15 u^2. */
export function reciprocalFactorial(n: number): DoubleDouble {
  return table[n]!;
}
