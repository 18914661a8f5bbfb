/**
 * Puts together WebAssembly with vectors of four floats (the SIMD part of WebAssembly 2.0, https://www.w3.org/TR/wasm-core-2/, chapter 5 for the
 * bytes): loops over rows of floats, four at a time. JavaScript has no such vectors, and takes five times as long over these rows.
 */

/** Instructions that leave one vector on the stack, or none. */
export type Code = readonly number[];

/** A loop over rows. `steps` are the bytes that each pointer moves on by each time round; `body` is run once each time. */
export interface Kernel {
  steps: readonly number[];
  body: Code;
}

/** Vectors that a body can keep. */
const VARIABLES = 6;

/** Whole numbers as LEB128, unsigned. */
function unsigned(value: number): number[] {
  return value < 128 ? [value] : [(value & 127) | 128, ...unsigned(value >>> 7)];
}

/** The same, signed. */
function signed(value: number): number[] {
  return value >= -64 && value < 64 ? [value & 127] : [(value & 127) | 128, ...signed(value >> 7)];
}

const vector = (operation: number, ...operands: Code[]): Code => [...operands.flat(), 0xfd, ...unsigned(operation)];
const both = (operation: number) => (left: Code, right: Code) => vector(operation, left, right);
const one = (operation: number) => (value: Code) => vector(operation, value);

export const add = both(0xe4);
export const subtract = both(0xe5);
export const multiply = both(0xe6);
export const divide = both(0xe7);
export const smaller = both(0xe8);
export const larger = both(0xe9);
export const magnitude = one(0xe0);
export const root = one(0xe3);
export const nearest = one(0x6a);
/** Between four floats and four whole numbers. */
export const toWhole = one(0xf8);
export const toFloats = one(0xfa);
export const addWhole = both(0xae);
export const either = both(0x50);

/** Four whole numbers, each moved up by so many bits. */
export const movedUp = (value: Code, bits: number): Code => [...value, 0x41, ...signed(bits), 0xfd, ...unsigned(0xab)];

function constant(lanes: Float32Array | Int32Array): Code {
  return [0xfd, 0x0c, ...new Uint8Array(lanes.buffer)];
}
/** The same float four times. */
export const floats = (value: number) => constant(new Float32Array(4).fill(value));
export const wholes = (value: number) => constant(new Int32Array(4).fill(value));

/** Four floats from where a pointer stands, or `ahead` floats further on. */
export const load = (pointer: number, ahead = 0): Code => [0x20, pointer, 0xfd, 0x00, 0, ...unsigned(ahead * 4)];
export const store = (pointer: number, value: Code, ahead = 0): Code => [0x20, pointer, ...value, 0xfd, 0x0b, 0, ...unsigned(ahead * 4)];

/** Sixteen bytes chosen from the thirty-two of two vectors. */
export const choose = (left: Code, right: Code, bytes: readonly number[]): Code => [...left, ...right, 0xfd, 0x0d, ...bytes];

/** Floats chosen from the eight of two vectors. */
export const chooseFloats = (left: Code, right: Code, lanes: readonly number[]): Code =>
  choose(
    left,
    right,
    lanes.flatMap((lane) => [0, 1, 2, 3].map((byte) => lane * 4 + byte)),
  );

/** A vector's name within a body; pointers come first, then the count of rounds. */
const variable = (pointers: number, index: number) => pointers + 1 + index;
export const keep = (pointers: number, index: number, value: Code): Code => [...value, 0x21, variable(pointers, index)];
export const kept = (pointers: number, index: number): Code => [0x20, variable(pointers, index)];

const section = (id: number, content: Code) => [id, ...unsigned(content.length), ...content];
const list = (items: Code[]) => [...unsigned(items.length), ...items.flat()];
const named = (name: string) => list([...Buffer.from(name)].map((byte) => [byte]));

/** One function: pointers, then how often to go round, which must be at least once. */
function functionBody({ steps, body }: Kernel): Code {
  const rounds = steps.length;
  const moved = steps.flatMap((step, pointer) => [0x20, pointer, 0x41, ...signed(step), 0x6a, 0x21, pointer]);
  const again = [0x20, rounds, 0x41, 1, 0x6b, 0x22, rounds, 0x0d, 0];
  const code = [1, VARIABLES, 0x7b, 0x03, 0x40, ...body, ...moved, ...again, 0x0b, 0x0b];
  return [...unsigned(code.length), ...code];
}

/** The bytes of a module that imports its memory as `row.s` and exports each kernel by its name. */
export function assemble(kernels: Record<string, Kernel>): Uint8Array<ArrayBuffer> {
  const all = Object.entries(kernels);
  const types = all.map(([, { steps }]) => [0x60, ...list([...steps, 0].map(() => [0x7f])), 0]);
  return new Uint8Array([
    ...[0x00, 0x61, 0x73, 0x6d, 1, 0, 0, 0],
    ...section(1, list(types)),
    ...section(2, list([[...named('row'), ...named('s'), 0x02, 0x00, 1]])),
    ...section(3, list(all.map((_, index) => unsigned(index)))),
    ...section(7, list(all.map(([name], index) => [...named(name), 0x00, ...unsigned(index)]))),
    ...section(10, list(all.map(([, kernel]) => functionBody(kernel)))),
  ]);
}
