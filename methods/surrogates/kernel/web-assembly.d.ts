/** The part of WebAssembly that the kernel uses; neither the ES library nor Node's types declare it. */
declare namespace WebAssembly {
  class Memory {
    readonly buffer: ArrayBuffer;
    grow(pages: number): number;
  }

  class Module {
    constructor(bytes: Uint8Array<ArrayBuffer>);
  }

  class Instance {
    readonly exports: Readonly<Record<string, unknown>>;
    constructor(module: Module);
  }
}
