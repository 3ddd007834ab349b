/** Finds the row that holds a pair of numbers: an open hash table over row numbers, 8 bytes a row at most. */
export interface PairIndex {
  /** Row with the pair, or −1. */
  readonly find: (a: number, b: number) => number;
  /** Enters the pair of a row; pairs are entered once. */
  readonly enter: (row: number, a: number, b: number) => void;
}

/** @param pairOf tells a row's pair again, so that the table itself need not keep it */
export function pairIndex(first: (row: number) => number, second: (row: number) => number): PairIndex {
  let slots = new Int32Array(2048);
  let entered = 0;

  function slotOf(a: number, b: number): number {
    const mask = slots.length - 1;
    let hash = Math.imul(a, 0x9e3779b1) ^ Math.imul(b, 0x85ebca77);
    hash = Math.imul(hash ^ (hash >>> 15), 0x2c1b3c6d);
    let slot = (hash ^ (hash >>> 13)) & mask;
    for (;;) {
      const row = (slots[slot] ?? 0) - 1;
      if (row < 0 || (first(row) === a && second(row) === b)) return slot;
      slot = (slot + 1) & mask;
    }
  }

  function grow(): void {
    const old = slots;
    slots = new Int32Array(old.length * 2);
    for (const held of old) if (held > 0) slots[slotOf(first(held - 1), second(held - 1))] = held;
  }

  return {
    find: (a, b) => (slots[slotOf(a, b)] ?? 0) - 1,
    enter: (row, a, b) => {
      if (2 * (entered + 1) > slots.length) grow();
      entered += 1;
      slots[slotOf(a, b)] = row + 1;
    },
  };
}
