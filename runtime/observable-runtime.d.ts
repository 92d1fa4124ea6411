// Types for the little of @observablehq/runtime 6.0.1 that the engine uses; the package ships none.
declare module "@observablehq/runtime" {
  export interface Observer {
    pending?(): void;
    fulfilled?(value: unknown, name: string): void;
    rejected?(error: unknown, name: string): void;
  }
  export interface Variable {
    define(name: string, inputs: readonly string[], definition: (...inputs: never[]) => unknown): this;
    delete(): this;
  }
  export interface Module {
    variable(observer: Observer): Variable;
  }
  export class Runtime {
    constructor(builtins?: object, global?: (name: string) => unknown);
    module(): Module;
    dispose(): void;
    /** When the next pass begins; left writable by the library, so that a host can choose its moment. */
    _computeSoon: () => Promise<void>;
    _computeNow(): Promise<void>;
  }
}
