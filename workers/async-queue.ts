/** Values that one side hands over and the other awaits, in order. */
export interface AsyncQueue<T> extends AsyncIterable<T> {
  readonly push: (value: T) => void;
  /** No more will come. */
  readonly end: () => void;
  /** No more will come, because of this: whoever awaits gets it thrown, after the values before it. */
  readonly fail: (error: unknown) => void;
}

export function asyncQueue<T>(): AsyncQueue<T> {
  const values: T[] = [];
  let ended: { readonly error: unknown } | null = null;
  let wake: () => void = () => undefined;
  const stop = (error: unknown): void => {
    ended ??= { error };
    wake();
  };
  return {
    push: (value) => {
      values.push(value);
      wake();
    },
    end: () => stop(null),
    fail: stop,
    async *[Symbol.asyncIterator]() {
      for (;;) {
        const next = values.shift();
        if (next !== undefined) yield next;
        else if (ended?.error) throw ended.error as Error;
        else if (ended) return;
        else await new Promise<void>((resolve) => (wake = resolve));
      }
    },
  };
}
