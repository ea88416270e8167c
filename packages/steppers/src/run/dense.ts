/**
 * State at theta of a step of length h from its stage slopes: y(theta) = y0 + h sum_i b_i(theta) k_i, b_i(theta) = sum_k rows[i][k]
 * theta^(k+1). `slopes` holds the position slopes of all stages, then the velocity slopes. Error: that of the continuous formula's order.
 */
export function evaluateDense(
  rows: readonly (readonly number[])[],
  theta: number,
  h: number,
  before: Float64Array,
  slopes: Float64Array,
  out: Float64Array,
): void {
  const d = before.length / 2;
  out.set(before);
  rows.forEach((row, i) => {
    let weight = 0;
    for (let k = row.length - 1; k >= 0; k -= 1) weight = (weight + row[k]!) * theta;
    for (let k = 0; k < d; k += 1) {
      out[k] = out[k]! + h * weight * slopes[i * d + k]!;
      out[d + k] = out[d + k]! + h * weight * slopes[(rows.length + i) * d + k]!;
    }
  });
}
