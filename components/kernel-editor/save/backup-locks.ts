/** Which backups belong to tabs that are still open: each tab holds a lock by its key, and a crash lets it go. */

/** Holds the key until the returned function is called or the tab ends. */
export function holdBackupKey(key: string): () => void {
  if (!('locks' in navigator)) return () => {};
  let letGo = () => {};
  const held = new Promise<void>((resolve) => {
    letGo = resolve;
  });
  void navigator.locks.request(key, () => held);
  return letGo;
}

export async function openBackupKeys(): Promise<ReadonlySet<string>> {
  if (!('locks' in navigator)) return new Set();
  const { held = [], pending = [] } = await navigator.locks.query();
  return new Set([...held, ...pending].flatMap(({ name }) => (name === undefined ? [] : [name])));
}
