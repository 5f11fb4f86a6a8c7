/** Where to go after signing in: a path of this site, never another host. */
export function safeNext(next: unknown): string {
  if (typeof next !== 'string' || !next.startsWith('/')) return '/';
  // A second slash or a backslash would make browsers read a host.
  return /^\/[/\\]/.test(next) || next.startsWith('/sign-in') ? '/' : next;
}
