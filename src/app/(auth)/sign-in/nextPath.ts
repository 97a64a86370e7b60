const HERE = 'http://stillfield.invalid';

/**
 * Where to go after signing in: the path the reader came from, if it is one of ours; otherwise `/`. Anything a browser
 * could read as another site (`//host`, `/\host`, a scheme, control characters it strips) is not.
 */
export function nextPath(wanted: string | string[] | undefined): string {
  if (typeof wanted !== 'string' || !/^\/[^\p{Cc}\\]*$/u.test(wanted) || wanted.length > 2000) return '/';
  if (!URL.canParse(wanted, HERE)) return '/';
  const { origin, pathname, search, hash } = new URL(wanted, HERE);
  if (origin !== HERE || pathname.startsWith('//')) return '/';
  if (/^\/(api|sign-in|_next)(\/|$)/.test(pathname)) return '/';
  return pathname + search + hash;
}
