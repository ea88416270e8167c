import { lanesAvailable } from "@perigauge/steppers";

let noted = false;

/** Says once, on stderr, that cells run one by one because this host has no vectors. */
export function noteFallback(): void {
  if (noted || lanesAvailable()) return;
  noted = true;
  process.stderr.write(
    "note: no WebAssembly vectors on this host; cells run one by one, several times slower\n",
  );
}
