/** Raised where the input is wrong; its message is the one line the user sees, and the exit code is 2. */
export class InvalidInputError extends RangeError {
  override readonly name = "InvalidInputError";
}

/** `where: must be RULE, got VALUE` */
export function mustBe(where: string, rule: string, value: unknown): InvalidInputError {
  return new InvalidInputError(`${where}: must be ${rule}, got ${describeValue(value)}`);
}

export function describeValue(value: unknown): string {
  if (typeof value === "number") return String(value);
  const text = JSON.stringify(value) ?? String(value);
  return text.length > 80 ? `${text.slice(0, 77)}...` : text;
}
