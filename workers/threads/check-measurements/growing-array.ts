/** Numbers in one block of memory that doubles when it is full. */
export interface GrowingArray {
  readonly push: (value: number) => void;
  readonly get: (index: number) => number;
  readonly set: (index: number, value: number) => void;
  readonly length: () => number;
}

export function growingArray(kind: typeof Int32Array | typeof Float64Array): GrowingArray {
  let block = new kind(1024);
  let length = 0;
  return {
    push: (value) => {
      if (length === block.length) {
        const larger = new kind(block.length * 2);
        larger.set(block);
        block = larger;
      }
      block[length] = value;
      length += 1;
    },
    get: (index) => block[index] ?? NaN,
    set: (index, value) => {
      block[index] = value;
    },
    length: () => length,
  };
}
