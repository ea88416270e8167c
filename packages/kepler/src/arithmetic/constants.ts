import type { DoubleDouble } from "./double-double.ts";

/** pi/2 = sum of three doubles, to 2^-161. */
export const halfPi: DoubleDouble = { hi: 1.5707963267948966, lo: 6.123233995736766e-17 };
/** Third word of pi/2. */
export const halfPiThird: number = -1.4973849048591833e-33;
/** pi to 2^-107. */
export const pi: DoubleDouble = { hi: Math.PI, lo: 1.2246467991473532e-16 };
/** 2 pi to 2^-106. */
export const twoPi: DoubleDouble = { hi: 6.283185307179586, lo: 2.4492935982947064e-16 };
