/** Running maximum of an absolute value and the step it was met at. Errors are finite here: `findEnd` has cut the rest. */
export class Maximum {
  value = -1;
  atStep = 0;
  /** Time of that step where steps are uneven, in normalised units. */
  atTime = 0;

  /** `firstStep` is the step number of row 0 of the chunk; `times` is given where steps are uneven. */
  accept(
    errors: Float64Array,
    from: number,
    to: number,
    firstStep: number,
    times: Float64Array | null,
  ): void {
    let largest = this.value;
    let at = -1;
    for (let i = from; i < to; i++) {
      const size = Math.abs(errors[i]!);
      if (size > largest) {
        largest = size;
        at = i;
      }
    }
    if (at < 0) return;
    this.value = largest;
    this.atStep = firstStep + at;
    if (times !== null) this.atTime = times[2 * at]!;
  }
}
