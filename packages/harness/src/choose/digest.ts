import { createHash } from "node:crypto";

/** SHA-256, in hexadecimal, of a value's JSON: the same result gives the same digest. */
export function digestOf(value: unknown): string {
  return createHash("sha256").update(JSON.stringify(value)).digest("hex");
}
