/** A browser and system in words from what the browser calls itself; enough to recognise one's own. */
export function browserName(userAgent: string): string {
  const browser =
    [
      ['Edg/', 'Edge'],
      ['OPR/', 'Opera'],
      ['Firefox/', 'Firefox'],
      ['Chrome/', 'Chrome or Chromium'],
      ['Safari/', 'Safari'],
    ].find(([mark]) => userAgent.includes(mark ?? ''))?.[1] ?? 'Unknown browser';
  const system = [
    ['Android', 'Android'],
    ['iPhone', 'iPhone'],
    ['iPad', 'iPad'],
    ['Windows', 'Windows'],
    ['Mac OS X', 'macOS'],
    ['Linux', 'Linux'],
  ].find(([mark]) => userAgent.includes(mark ?? ''))?.[1];
  return system ? `${browser} on ${system}` : browser;
}
