import 'server-only';

/** Text that is made while it is sent: a piece is asked for when the reader has room, and no more once it has gone away. */
export function streamOf(pieces: AsyncGenerator<string>): ReadableStream<Uint8Array> {
  const encoder = new TextEncoder();
  return new ReadableStream<Uint8Array>(
    {
      pull: async (controller) => {
        const next = await pieces.next();
        if (next.done === true) controller.close();
        else controller.enqueue(encoder.encode(next.value));
      },
      cancel: async () => {
        await pieces.return(undefined);
      },
    },
    { highWaterMark: 1 },
  );
}
