/** As much of WebAssembly as is used here: the library is compiled without a browser's types, and may run where there is none of it. */
interface WebAssemblyApi {
  Module: new (bytes: Uint8Array) => object;
  Instance: new (module: object) => { exports: unknown };
}
const { WebAssembly: api } = globalThis as unknown as { WebAssembly?: WebAssemblyApi };

/** Compiles a module that imports nothing. What comes makes an instance of it and gives its exports; null where WebAssembly or its SIMD is missing. */
export function compileModule(base64: string): (() => unknown) | null {
  if (api === undefined) return null;
  const { Module, Instance } = api;
  try {
    const module = new Module(Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0)));
    return () => new Instance(module).exports;
  } catch {
    return null;
  }
}
