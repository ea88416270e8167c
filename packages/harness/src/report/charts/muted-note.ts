import type { Looks } from "../look/stepper-look.ts";
import { plural } from "../text/words.ts";

/** What the grey marks are, where there are any. */
export function mutedNote(looks: Looks): string {
  if (looks.muted.length === 0) return "";
  return `Grey: ${plural(looks.muted.length, "other stepper")}, whole lines symplectic, dashed lines not.`;
}
