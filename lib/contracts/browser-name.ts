const browsers: readonly (readonly [RegExp, string])[] = [
  [/Edg\/(\d+)/, 'Edge'],
  [/Firefox\/(\d+)/, 'Firefox'],
  [/Chrom(?:e|ium)\/(\d+)/, 'Chromium'],
  [/Version\/(\d+)[^ ]* (?:Mobile\/\S+ )?Safari\//, 'Safari'],
];
const systems: readonly (readonly [RegExp, string])[] = [
  [/Android/, 'Android'],
  [/iPhone|iPad/, 'iOS'],
  [/Windows/, 'Windows'],
  [/Mac OS X/, 'macOS'],
  [/Linux|X11/, 'Linux'],
];

/** A browser in words a person recognises, of what it says of itself: `Firefox 128 on Linux`. */
export function browserName(userAgent: string): string {
  if (userAgent === '') return 'unknown program';
  const browser = browsers.flatMap(([pattern, name]) => {
    const version = pattern.exec(userAgent)?.[1];
    return version === undefined ? [] : [`${name} ${version}`];
  })[0];
  const system = systems.find(([pattern]) => pattern.test(userAgent))?.[1];
  if (browser === undefined) return userAgent.slice(0, 40);
  return system === undefined ? browser : `${browser} on ${system}`;
}
