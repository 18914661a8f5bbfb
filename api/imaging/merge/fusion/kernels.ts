import {
  add,
  addWhole,
  assemble,
  choose,
  chooseFloats,
  divide,
  either,
  floats,
  keep,
  kept,
  larger,
  load,
  magnitude,
  movedUp,
  multiply,
  nearest,
  root,
  smaller,
  store,
  subtract,
  toFloats,
  toWhole,
  wholes,
  type Code,
  type Kernel,
} from './assemble.ts';

const times = (factor: number, value: Code) => multiply(floats(factor), value);
const sum = (...values: Code[]) => values.reduce((total, value) => add(total, value));
const square = (value: Code) => multiply(value, value);

/** Luma of ITU-R BT.601, as the paper's authors and OpenCV take grey, of bytes on a scale of 0 to 1. */
const GREY = [0.299 / 255, 0.587 / 255, 0.114 / 255] as const;
/** So that pixels without any quality in any frame become their average. */
const FLOOR = 1e-12;

/** Sums weighted 1 4 6 4 1. */
const fiveTaps = (before: Code, left: Code, middle: Code, right: Code, after: Code) =>
  sum(before, after, times(4, add(left, right)), times(6, middle));
/** What lies between samples two apart: at a sample, and half way to the next. */
const atSample = (before: Code, middle: Code, after: Code) => add(times(0.125, add(before, after)), times(0.75, middle));
const halfWay = (middle: Code, after: Code) => times(0.5, add(middle, after));

/** Every other float of eight, from `ahead` floats past the pointer. */
const everyOther = (ahead: number) => chooseFloats(load(0, ahead), load(0, ahead + 4), [0, 2, 4, 6]);

/** Four bytes, three apart, as floats. The upper bytes of each number come from a vector of zeros. */
const channel = (first: number) =>
  toFloats(
    choose(
      load(0),
      wholes(0),
      [0, 3, 6, 9].flatMap((pixel) => [first + pixel, 16, 16, 16]),
    ),
  );

/** 2 to the power of a vector that is not above 0: the whole part becomes the exponent's bits, the rest a series whose error is below 2e-7. */
function powerOfTwo(pointers: number, value: Code): { before: Code; result: Code } {
  const [whole, rest] = [kept(pointers, 1), kept(pointers, 2)];
  const series = [1, 0, 0, 0, 0, 0, 0].reduce<number[]>(
    (terms, _, at) => [...terms, at === 0 ? 1 : (terms[at - 1] ?? 0) * (Math.LN2 / at)],
    [],
  );
  const polynomial = series.reduceRight<Code>((total, term) => add(multiply(total, rest), floats(term)), floats(0));
  const before = [
    ...keep(pointers, 0, larger(value, floats(-120))),
    ...keep(pointers, 1, nearest(kept(pointers, 0))),
    ...keep(pointers, 2, subtract(kept(pointers, 0), whole)),
  ];
  return { before, result: multiply(polynomial, movedUp(addWhole(toWhole(whole), wholes(127)), 23)) };
}

function exposedness(): Kernel {
  const away = [0, 1, 2].map((colour) => square(subtract(times(1 / 255, load(colour)), floats(0.5)))) as [Code, Code, Code];
  const { before, result } = powerOfTwo(5, multiply(load(4), sum(...away)));
  return { steps: [16, 16, 16, 16, 0], body: [...before, ...store(3, add(multiply(load(3), result), floats(FLOOR)))] };
}

function saturation(): Kernel {
  const [red, green, blue, mean] = [load(0), load(1), load(2), kept(4, 0)];
  const spread = sum(...[red, green, blue].map((colour) => square(subtract(colour, mean))));
  return {
    steps: [16, 16, 16, 16],
    body: [...keep(4, 0, times(1 / 3, sum(red, green, blue))), ...store(3, times(1 / 255, root(times(1 / 3, spread))))],
  };
}

/** Adds weight × (row − the coarser level at its place) to what is there. */
const detail = (coarser: Code): Kernel => ({
  steps: [16, 16, 16, 16, 16, 16],
  body: store(0, add(load(0), multiply(load(2), subtract(load(1), coarser)))),
});

function gather(): Kernel {
  const byte = (colour: number) => toWhole(nearest(smaller(larger(load(colour), floats(0)), floats(255))));
  const pixels = either(byte(0), either(movedUp(byte(1), 8), movedUp(byte(2), 16)));
  return { steps: [16, 16, 16, 12], body: store(3, choose(pixels, wholes(0), [0, 1, 2, 4, 5, 6, 8, 9, 10, 12, 13, 14, 16, 16, 16, 16])) };
}

/** Pointers of each, in this order; every one works on four samples each time round. */
const kernels = {
  /** RGB bytes; red, green, blue. */
  spread: { steps: [12, 16, 16, 16], body: [0, 1, 2].flatMap((colour) => store(colour + 1, channel(colour))) },
  /** Red, green, blue; RGB bytes, rounded, and up to seven bytes beyond them spoilt. */
  gather: gather(),
  /** Red, green, blue; grey. */
  grey: { steps: [16, 16, 16, 16], body: store(3, sum(...GREY.map((share, colour) => times(share, load(colour))))) },
  /** The row above, the row from one sample before, the row below; absolute response of the Laplacian [0 1 0; 1 −4 1; 0 1 0]. */
  contrast: {
    steps: [16, 16, 16, 16],
    body: store(3, magnitude(subtract(sum(load(0), load(2), load(1), load(1, 2)), times(4, load(1, 1))))),
  },
  /** Red, green, blue; their standard deviation (of three, not of a sample), 0 to 1. */
  saturation: saturation(),
  /** Red, green, blue; weights; four times −log2(e) / 2σ². Multiplies by exp(−(v − 0.5)² / 2σ²) of each colour. */
  exposedness: exposedness(),
  /** A row; a factor for each sample of it. */
  scale: { steps: [16, 16], body: store(0, multiply(load(0), load(1))) },
  /** Totals; a row to be added. */
  total: { steps: [16, 16], body: store(0, add(load(0), load(1))) },
  /** A row; what it is to be divided by. */
  share: { steps: [16, 16], body: store(0, divide(load(0), load(1))) },
  /** A row from two samples before; half of it, 16 times too large. */
  shrinkAlong: { steps: [32, 16], body: store(1, fiveTaps(everyOther(0), everyOther(1), everyOther(2), everyOther(3), everyOther(4))) },
  /** Five halved rows; the row of the coarser level. */
  shrinkDown: {
    steps: [16, 16, 16, 16, 16, 16],
    body: store(5, times(1 / 256, fiveTaps(load(0), load(1), load(2), load(3), load(4)))),
  },
  /** A row from one sample before; the row doubled. */
  growAlong: {
    steps: [16, 32],
    body: [
      ...keep(2, 0, atSample(load(0), load(0, 1), load(0, 2))),
      ...keep(2, 1, halfWay(load(0, 1), load(0, 2))),
      ...store(1, chooseFloats(kept(2, 0), kept(2, 1), [0, 4, 1, 5])),
      ...store(1, chooseFloats(kept(2, 0), kept(2, 1), [2, 6, 3, 7]), 4),
    ],
  },
  /** A row to be filled; the doubled rows above, at and below. For rows that lie at one of the coarser level. */
  growEven: { steps: [16, 16, 16, 16], body: store(0, atSample(load(1), load(2), load(3))) },
  /** The same for rows half way to the next. */
  growOdd: { steps: [16, 16, 16, 16], body: store(0, halfWay(load(2), load(3))) },
  /** What is summed up; the row, its weights; the doubled rows above, at and below. */
  detailEven: detail(atSample(load(3), load(4), load(5))),
  detailOdd: detail(halfWay(load(4), load(5))),
  /** What is summed up; the row, its weights. */
  plain: { steps: [16, 16, 16], body: store(0, add(load(0), multiply(load(1), load(2)))) },
} satisfies Record<string, Kernel>;

export type Kernels = Record<keyof typeof kernels, (...pointersAndRounds: number[]) => void>;

let compiled: WebAssembly.Module | undefined;

/** The kernels over a memory. Pointers are in bytes; the last argument is how many times four samples are done. */
export function kernelsOver(memory: WebAssembly.Memory): Kernels {
  compiled ??= new WebAssembly.Module(assemble(kernels));
  return new WebAssembly.Instance(compiled, { row: { s: memory } }).exports as Kernels;
}
