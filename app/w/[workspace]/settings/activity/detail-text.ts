type Detail = Record<string, string | number | boolean | null>;

/** The small facts of an entry in words: the name first and bare, then "wire hops: 16; time limit: 5 s". */
export function detailText(detail: Detail): string {
  const { name, ...rest } = detail;
  const facts = Object.entries(rest).map(([key, value]) => fact(key, value));
  return [...(name === undefined || name === null ? [] : [String(name)]), ...facts].join('; ');
}

function fact(key: string, value: Detail[string]): string {
  const milliseconds = key.endsWith('Ms') && typeof value === 'number';
  const words = (milliseconds ? key.slice(0, -2) : key).replace(/([A-Z])/g, ' $1').toLowerCase();
  if (milliseconds) return `${words}: ${value / 1000} s`;
  if (typeof value === 'boolean') return `${words}: ${value ? 'yes' : 'no'}`;
  return `${words}: ${value ?? 'none'}`;
}
