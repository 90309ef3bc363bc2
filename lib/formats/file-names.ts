/** What exported files are called: in letters, digits and dashes, which every file system and header takes. */

function plain(name: string, otherwise: string): string {
  const kept = name
    .normalize('NFKD')
    .replace(/×/g, 'x')
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .toLowerCase();
  return kept || otherwise;
}

const withVersion = (name: string, version: number | null): string =>
  version === null ? name : `${name}-v${version}`;

/** Version null: the present draft. `ending` is `kernel.json` or `dot`. */
export const kernelFileName = (name: string, version: number | null, ending: string): string =>
  `${withVersion(plain(name, 'kernel'), version)}.${ending}`;

export const fabricFileName = (name: string, version: number | null): string =>
  `${withVersion(plain(name, 'fabric'), version)}.fabric.json`;

/** `ending` is `json`, `certificate.json`, `svg` or `png`. */
export const mappingFileName = (name: string, ending: string): string =>
  `${plain(name, 'mapping')}.${ending}`;
