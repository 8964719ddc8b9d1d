/**
 * The compiled kernels at work: one instance with a memory of its own. The core is compiled without the types of a
 * browser or of Node, so the little of WebAssembly that is needed is declared here.
 */
import { bytesFromBase64 } from "./base64.ts";
import { KERNELS } from "./generated/kernels.ts";

interface WebAssemblyMemory {
  readonly buffer: ArrayBuffer;
}
interface WebAssemblyApi {
  Module: new (bytes: Uint8Array<ArrayBuffer>) => object;
  Instance: new (module: object, imports: object) => { readonly exports: object };
  Memory: new (size: { initial: number }) => WebAssemblyMemory;
  validate(bytes: Uint8Array<ArrayBuffer>): boolean;
}
interface Global {
  readonly value: number;
}

/** What assembly/index.ts exports. All pointers are byte offsets. */
export interface KernelExports {
  allocateInts(count: number): number;
  allocateReals(count: number): number;
  mark(): number;
  reset(to: number): void;
  analyze(size: number, rowStart: number, columns: number, coordinates: number): void;
  newFactor(): number;
  beginFactorization(factor: number, values: number): void;
  /** 0 failed, 1 done, 2 more to do */
  continueFactorization(factor: number, least: number, work: number): number;
  factorizationWork(): number;
  solve(factor: number, x: number): void;
  multiplyAdd(values: number, x: number, z: number, y: number): void;
  factorPanel(panel: number, rows: number, width: number, reciprocals: number, least: number): number;
  subtractProducts(
    c: number,
    cStride: number,
    a: number,
    rows: number,
    b: number,
    count: number,
    stride: number,
    depth: number,
    lower: number,
  ): void;
  readonly outerOf: Global;
  readonly innerOf: Global;
  readonly diagonal: Global;
  readonly rowStart: Global;
  readonly columns: Global;
  readonly source: Global;
  readonly supernodes: Global;
  readonly workX: Global;
  readonly workY: Global;
  readonly factorEntries: Global;
  readonly factorWork: Global;
  readonly failedUnknown: Global;
  readonly failedPivot: Global;
  readonly failedDiagonal: Global;
}

export interface KernelInstance {
  readonly exports: KernelExports;
  /** bytes of the memory now */
  bytes(): number;
  /** views that hold until the memory grows: take them anew after every allocation */
  ints(pointer: number, count: number): Int32Array;
  reals(pointer: number, count: number): Float64Array;
}

const api = (globalThis as unknown as { WebAssembly?: WebAssemblyApi }).WebAssembly;
let compiled: object | null | undefined;

/** Whether the kernels can run here: WebAssembly with SIMD. */
export function kernelsAvailable(): boolean {
  return kernelModule() !== null;
}

/** Compiled once; null where WebAssembly SIMD is missing or compiling is forbidden. */
function kernelModule(): object | null {
  if (compiled !== undefined) return compiled;
  compiled = null;
  if (!api) return null;
  try {
    const bytes = bytesFromBase64(KERNELS);
    if (api.validate(bytes)) compiled = new api.Module(bytes);
  } catch {
    // A content policy may forbid compiling: the plain solver then serves.
  }
  return compiled;
}

/**
 * Instances given back, for reuse: a memory of its own is costly to set up (every page is touched anew), and the
 * address space that holds them is limited.
 */
let idle: KernelInstance[] = [];
const IDLE_KEPT = 2;

/** @throws when the kernels are not available; ask `kernelsAvailable` first */
export function takeInstance(): KernelInstance {
  return idle.pop() ?? newInstance();
}

/** The instance may be taken again, or is left to the garbage collector when enough are idle. */
export function giveBackInstance(instance: KernelInstance): void {
  instance.exports.reset(0);
  idle.push(instance);
  if (idle.length > IDLE_KEPT) idle.shift();
}

/** Leave idle memories of more than `bytes` to the garbage collector: a memory cannot shrink. */
export function forgetIdleInstances(bytes: number): void {
  idle = idle.filter((instance) => instance.bytes() <= bytes);
}

function newInstance(): KernelInstance {
  const module = kernelModule();
  if (!module || !api) throw new Error("WebAssembly SIMD is not available here");
  const memory = new api.Memory({ initial: 2 });
  const abort = () => {
    throw new Error("a kernel broke an invariant");
  };
  const { exports } = new api.Instance(module, { env: { memory, abort } });
  return {
    exports: exports as KernelExports,
    bytes: () => memory.buffer.byteLength,
    ints: (pointer, count) => new Int32Array(memory.buffer, pointer, count),
    reals: (pointer, count) => new Float64Array(memory.buffer, pointer, count),
  };
}
