import type { Complex, ComplexNumeric, Real } from "../number/values.ts";

/** What a function of the plane is called with, and what it gives. */
export type PlaneFunction = (z: ComplexNumeric) => Real | Complex;

class Base {
  constructor(call: PlaneFunction) {
    const callable = (z: ComplexNumeric) => call(z);
    // biome-ignore lint/correctness/noConstructorReturn: an instance is itself a function, and its class's methods are its methods
    return Object.setPrototypeOf(callable, new.target.prototype);
  }
}

/** Base of classes whose instances are called like functions: `class F extends Callable { constructor() { super(z => ...) } }`. */
export const Callable = Base as unknown as abstract new (call: PlaneFunction) => PlaneFunction;
