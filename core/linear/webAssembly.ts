/** The few members of WebAssembly that are used here, and what happens where a host has none or forbids it. */

interface WasmMemory {
  readonly buffer: ArrayBuffer;
}

type WasmFunction = (...parameters: number[]) => number;

interface WasmHost {
  readonly Memory: new (size: { initial: number }) => WasmMemory;
  readonly Module: new (bytes: Uint8Array) => object;
  readonly Instance: new (
    module: object,
    imports: object,
  ) => { readonly exports: Readonly<Record<string, WasmFunction>> };
}

declare const WebAssembly: WasmHost | undefined;

/** Bytes in a page of memory, by the WebAssembly core specification. */
export const PAGE = 65_536;

/** The functions of a module with the memory they work on. */
export interface WasmKernel {
  readonly memory: WasmMemory;
  readonly functions: Readonly<Record<string, WasmFunction>>;
}

/** Compiles a module once; `instantiate` gives it a memory of its own, or null where WebAssembly is missing or forbidden. */
export class WasmProgram {
  private readonly write: () => Uint8Array;
  private module: object | null | undefined;

  constructor(write: () => Uint8Array) {
    this.write = write;
  }

  instantiate(pages: number): WasmKernel | null {
    if (typeof WebAssembly === 'undefined') return null;
    if (this.module === undefined) this.module = compiled(WebAssembly, this.write());
    if (this.module === null) return null;
    try {
      const memory = new WebAssembly.Memory({ initial: pages });
      const { exports } = new WebAssembly.Instance(this.module, { host: { memory } });
      return { memory, functions: exports };
    } catch {
      return null; // short of memory or of address space
    }
  }
}

/** Null where a content policy forbids compilation, or a host does not know the instructions. */
function compiled(host: WasmHost, bytes: Uint8Array): object | null {
  try {
    return new host.Module(bytes);
  } catch {
    return null;
  }
}
