/** Where to go after signing in: a path of this site, never another site's address. */
export function nextPath(wanted: unknown): string {
  if (typeof wanted !== 'string' || wanted.length > 500) return '/';
  // "//host" and "/\host" lead elsewhere.
  return /^\/(?![/\\])[^\s\\]*$/.test(wanted) ? wanted : '/';
}
