/**
 * The elementary functions of the engine: the door to `elementary/`.
 *
 * JavaScript engines are free to differ in the last bit of Math.exp, Math.log, Math.cos, Math.pow. These
 * use only + - * /, Math.sqrt, Math.floor, Math.abs, Math.min and the bits of a double, which every engine
 * must do alike, so that a price has the same 64 bits everywhere. Each is good to 1 ulp (`erfcx`
 * to 2), measured against mpmath in tests/pricing/numerics/elementary.test.ts.
 */
export { cos, sin } from './elementary/trigonometric';
export { erfc, erfcx } from './elementary/erfc';
export { exp, expm1 } from './elementary/exp';
export { log, log1p, logRatio } from './elementary/log';
export { pow } from './elementary/pow';
