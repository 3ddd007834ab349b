import 'server-only';

const nowhere = 'http://evenfall.invalid';

/**
 * A path within this service out of what an address or a form said, or `/`. Browsers read `//host`, `/\host` and control
 * characters as other sites, so the path is what a URL parser makes of it, and only if it stayed here.
 */
export function localPath(wanted: unknown): `/${string}` {
  if (typeof wanted !== 'string' || wanted.length > 1000 || !wanted.startsWith('/')) return '/';
  if (!URL.canParse(wanted, nowhere)) return '/';
  const url = new URL(wanted, nowhere);
  const path = `${url.pathname}${url.search}${url.hash}`;
  if (url.origin !== nowhere || path.startsWith('//')) return '/';
  return path as `/${string}`;
}
