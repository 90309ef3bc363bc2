/** A plain file name from a title: ASCII letters, digits and hyphens, so it is safe in a header and on any disk. */
export function exportFileName(name: string, version?: number): string {
  const plain = name
    .normalize('NFKD')
    .replace(/×/g, 'x')
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .toLowerCase();
  return `${plain || 'fabric'}${version ? `-v${version}` : ''}.fabric.json`;
}
