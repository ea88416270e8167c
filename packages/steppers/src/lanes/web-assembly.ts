/** The part of the host's WebAssembly interface that kernels use (typed here: it belongs neither to the language nor to Node's types). */
interface Host {
  readonly Memory: new (descriptor: { readonly initial: number }) => LaneMemory;
  readonly Module: new (bytes: Uint8Array<ArrayBuffer>) => object;
  readonly Instance: new (module: object, imports: object) => { readonly exports: object };
}

/** Memory that kernels share: 64 KiB pages; growing it replaces `buffer`. */
export interface LaneMemory {
  readonly buffer: ArrayBuffer;
  grow(pages: number): number;
}

export type KernelFunction = (...args: number[]) => number;

function host(): Host {
  const found = (globalThis as unknown as { readonly WebAssembly?: Host }).WebAssembly;
  if (found === undefined) throw new Error("lanes: this host has no WebAssembly");
  return found;
}

/** @throws Error where the host has no WebAssembly. */
export function laneMemory(bytes: number): LaneMemory {
  return new (host().Memory)({ initial: Math.ceil(bytes / 65536) });
}

/** Compiles a module over `memory`. @throws Error where the host has no WebAssembly, or not these instructions. */
export function instantiateModule(
  bytes: Uint8Array<ArrayBuffer>,
  memory: LaneMemory,
): Readonly<Record<string, KernelFunction>> {
  const { Module, Instance } = host();
  const { exports } = new Instance(new Module(bytes), { lanes: { memory } });
  return exports as Readonly<Record<string, KernelFunction>>;
}
