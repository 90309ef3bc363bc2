/** SVG as text: elements with escaped attributes and content. */

type Attributes = Readonly<Record<string, string | number | undefined>>;

const escapes: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
};

/** Escapes markup, and drops control characters, which XML 1.0 cannot hold (https://www.w3.org/TR/xml/#charsets). */
export const escapeXml = (text: string): string =>
  [...text]
    .filter((letter) => letter >= ' ' || letter === '\t' || letter === '\n')
    .join('')
    .replace(/[&<>"]/g, (letter) => escapes[letter] ?? letter);

export function element(name: string, attributes: Attributes, content?: string): string {
  const written = Object.entries(attributes)
    .filter(([, value]) => value !== undefined && value !== '')
    .map(
      ([key, value]) => ` ${key}="${escapeXml(typeof value === 'number' ? rounded(value) : String(value))}"`,
    )
    .join('');
  return content === undefined ? `<${name}${written}/>` : `<${name}${written}>${content}</${name}>`;
}

export const textElement = (text: string, attributes: Attributes): string =>
  element('text', attributes, escapeXml(text));

const rounded = (value: number): string => String(Math.round(value * 100) / 100);
