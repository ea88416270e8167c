import { encodeModule, type FunctionCode } from "./encoder.ts";
import { instantiateModule, type KernelFunction, type LaneMemory } from "./web-assembly.ts";

/** Compiles functions into one instance over `memory`. @throws Error where the host has no WebAssembly with vectors. */
export function compileLanes(
  functions: readonly FunctionCode[],
  memory: LaneMemory,
): Readonly<Record<string, KernelFunction>> {
  return instantiateModule(encodeModule(functions), memory);
}
