const pause_ms = 10;

/** Watches the resident memory of this process, threads included; `stop` tells how far it rose above where it began. [MiB] */
export function peakMemory(): { readonly stop: () => number } {
  const begun = process.memoryUsage.rss();
  let peak = begun;
  const look = (): void => {
    peak = Math.max(peak, process.memoryUsage.rss());
  };
  const timer = setInterval(look, pause_ms);
  return {
    stop: () => {
      clearInterval(timer);
      look();
      return (peak - begun) / 1024 / 1024;
    },
  };
}
