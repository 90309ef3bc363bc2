/** Settings from the environment, read when they are needed, never at build time. DEVELOPERS.md lists them. */
import 'server-only';

/** Where people reach the application; links in letters start with it, never with a request's Host header. */
export function publicUrl(path: string): string {
  return new URL(path, process.env.PUBLIC_ADDRESS ?? 'http://127.0.0.1:3000').href;
}

/** Off only for plain http on a developer's own machine. */
export const secureCookies = (): boolean => process.env.COOKIE_SECURE !== '0';

/** True where letters are caught for reading on /mail instead of being sent. */
export const mailSinkOn = (): boolean => process.env.MAIL_SINK === '1';

/** Reverse proxies of our own in front of the application that append to x-forwarded-for. */
export function proxyHops(): number {
  const hops = Number(process.env.PROXY_HOPS ?? 0);
  return Number.isInteger(hops) && hops >= 0 ? hops : 0;
}
