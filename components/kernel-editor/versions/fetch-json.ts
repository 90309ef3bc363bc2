/** Reads JSON from our own API. Rejects with the server's sentence when it refuses. */
export async function fetchJson<T>(path: string): Promise<T> {
  const response = await fetch(path, { headers: { accept: 'application/json' } });
  if (response.ok) return (await response.json()) as T;
  const problem: unknown = await response.json().catch(() => null);
  const detail =
    typeof problem === 'object' && problem !== null && 'detail' in problem ? String(problem.detail) : '';
  throw new Error(detail || `the server answered ${response.status}`);
}
