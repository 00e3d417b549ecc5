/**
 * Columns that grow without ever holding two copies of themselves: blocks of 64 k numbers, each as small as its
 * numbers allow. Times that keep one step take no room at all; other times and heights of up to four decimals take half
 * of it; every number comes back exactly.
 * @module
 */
const BLOCK = 65536;
const DECIMALS = 10000;
const GAP = -2147483648; // NaN among the decimals
const LARGEST = 2147483647;

export interface NumberColumn {
  readonly length: () => number;
  readonly push: (value: number) => void;
  readonly at: (index: number) => number;
  /** Calls back in order and lets go of each block once it is read. */
  readonly drain: (each: (value: number, index: number) => void) => void;
  /** Calls back in order. */
  readonly scan: (each: (value: number, index: number) => void) => void;
}

interface Steady {
  readonly start: number;
  step: number;
}

/** Whole numbers counted from the first. */
interface Offsets {
  readonly start: number;
  readonly offsets: Uint32Array;
}

type Block = Float64Array | Int32Array | Steady | Offsets;

function valueAt(block: Block | undefined, i: number): number {
  if (!block) return Number.NaN;
  if (block instanceof Float64Array) return block[i] as number;
  if ('offsets' in block) return block.start + (block.offsets[i] as number);
  if (!(block instanceof Int32Array)) return block.start + i * block.step;
  const scaled = block[i] as number;
  return scaled === GAP ? Number.NaN : scaled / DECIMALS;
}

/** Puts a value into a block; false where it does not fit exactly. */
function put(block: Block, i: number, value: number): boolean {
  if (block instanceof Float64Array) {
    block[i] = value;
    return true;
  }
  if (block instanceof Int32Array) {
    const scaled = Number.isNaN(value) ? GAP : Math.round(value * DECIMALS);
    block[i] = scaled;
    return Math.abs(scaled) <= LARGEST ? scaled / DECIMALS === value : scaled === GAP;
  }
  if ('offsets' in block) {
    block.offsets[i] = value - block.start;
    return block.start + block.offsets[i] === value;
  }
  if (i === 1) block.step = value - block.start;
  return block.start + i * block.step === value;
}

/** The smallest roomier block that holds the numbers of a block and one more. */
function wider(block: Block, count: number, value: number): Block {
  if ('step' in block) {
    const next = { start: block.start, offsets: new Uint32Array(BLOCK) };
    let fits = put(next, count, value);
    for (let i = 0; i < count && fits; i++) fits = put(next, i, valueAt(block, i));
    if (fits) return next;
  }
  const next = new Float64Array(BLOCK);
  for (let i = 0; i < count; i++) next[i] = valueAt(block, i);
  next[count] = value;
  return next;
}

/** A column; `steady` for numbers that mostly rise by one step, such as times, `decimal` for heights. */
export function numberColumn(kind: 'steady' | 'decimal'): NumberColumn {
  const blocks: (Block | undefined)[] = [];
  let length = 0;
  return {
    length: () => length,
    at: (index) => valueAt(blocks[Math.floor(index / BLOCK)], index % BLOCK),
    push(value) {
      const i = length % BLOCK;
      if (i === 0)
        blocks.push(kind === 'steady' ? { start: value, step: 0 } : new Int32Array(BLOCK));
      const last = blocks.length - 1;
      const block = blocks[last] as Block;
      length++;
      if (!put(block, i, value)) blocks[last] = wider(block, i, value);
    },
    scan(each) {
      for (let i = 0; i < length; i++) each(valueAt(blocks[Math.floor(i / BLOCK)], i % BLOCK), i);
    },
    drain(each) {
      for (let b = 0; b < blocks.length; b++) {
        const end = Math.min(BLOCK, length - b * BLOCK);
        for (let i = 0; i < end; i++) each(valueAt(blocks[b], i), b * BLOCK + i);
        blocks[b] = undefined;
      }
      length = 0;
    },
  };
}
