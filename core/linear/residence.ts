/**
 * The memory in which compiled kernels work on factorisations that are used more than once. It is filled from the bottom up; when it is full
 * everybody has to leave, and comes back when next used. So its size is bounded and nobody needs to say when a factorisation is done with.
 */
import { symmetricProgram } from './symmetricKernel.ts';
import { PAGE, type WasmKernel } from './webAssembly.ts';

/** Somebody who lives here until told to leave. */
export interface Tenant {
  /** Takes along what it needs; its address is no longer its own. */
  leave(): void;
}

/**
 * Bytes of memory, enough for some thousand networks of wiring size. Reserved at once (the system provides pages as they are used), because
 * growing the memory would detach its old buffer, and the first detached buffer slows down every typed array of a process.
 */
const LIMIT = 256 * PAGE;

/**
 * Numbers worked on in plain JavaScript before the kernel is compiled: about ten milliseconds' worth, some thousand factorisations of a network
 * of 200 junctions. A short run never pays for a compilation that it would not earn back.
 */
const WORK_BEFORE_COMPILING = 2_000_000;

class Residence {
  private kernel: WasmKernel | null | undefined;
  private plainWork = 0;
  private tenants: Tenant[] = [];
  private top = 0;

  /** The kernel, compiled if need be; null where the host has no WebAssembly or forbids it. */
  get functions(): WasmKernel['functions'] | null {
    if (this.kernel === undefined) this.kernel = symmetricProgram.instantiate(LIMIT / PAGE);
    return this.kernel === null ? null : this.kernel.functions;
  }

  get buffer(): ArrayBuffer {
    return this.kernel!.memory.buffer;
  }

  /** Notes that so many numbers have been worked on without the kernel. */
  notePlainWork(numbers: number): void {
    this.plainWork += numbers;
  }

  /** The address of a block of so many bytes, a multiple of 16, or -1 where there is no kernel yet or the block is too large. */
  admit(tenant: Tenant, bytes: number): number {
    if (this.kernel === undefined && this.plainWork < WORK_BEFORE_COMPILING) return -1;
    if (this.functions === null || bytes > LIMIT) return -1;
    if (this.top + bytes > LIMIT) this.clear();
    const address = this.top;
    this.top += bytes;
    this.tenants.push(tenant);
    return address;
  }

  private clear(): void {
    for (const tenant of this.tenants) tenant.leave();
    this.tenants = [];
    this.top = 0;
  }
}

export const residence = new Residence();
