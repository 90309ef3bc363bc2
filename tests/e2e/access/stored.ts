/** What the database of the product under test holds. */
import { spawnSync } from 'node:child_process';
import postgres from 'postgres';

export function openStored() {
  const { stdout, stderr } = spawnSync(process.execPath, ['scripts/db.mjs', 'url'], { encoding: 'utf8' });
  const url = stdout.trim();
  if (!url) throw new Error(`Where is the database of the product under test? ${stderr}`);
  const sql = postgres(url, { max: 1 });

  /** Tables that change by themselves: sessions are prolonged, workers beat, attempts are counted. */
  const restless = ['sessions', 'rate_limits', 'worker_heartbeats'];

  return {
    /** A digest of every row of every table that only a person's deed changes. */
    async fingerprint(): Promise<Record<string, string>> {
      const tables = await sql<{ name: string }[]>`
        select table_name as name from information_schema.tables
        where table_schema = 'public' and table_type = 'BASE TABLE'`;
      const digests: Record<string, string> = {};
      for (const { name } of tables) {
        if (restless.includes(name)) continue;
        const [row] = await sql<{ digest: string }[]>`
          select coalesce(md5(string_agg(t::text, ',' order by t::text)), '') as digest from ${sql(name)} t`;
        digests[name] = row?.digest ?? '';
      }
      return digests;
    },
    async userId(email: string): Promise<string> {
      const [row] = await sql<{ id: string }[]>`select id from users where email = ${email}`;
      if (!row) throw new Error(`No account ${email}`);
      return row.id;
    },
    async sessionIds(email: string): Promise<string[]> {
      const rows = await sql<{ id: string }[]>`
        select s.id from sessions s join users u on u.id = s.user_id where u.email = ${email}`;
      return rows.map(({ id }) => id);
    },
    async isMember(email: string, workspace: string): Promise<boolean> {
      const rows = await sql`
        select 1 from members m join users u on u.id = m.user_id join workspaces w on w.id = m.workspace_id
        where u.email = ${email} and w.slug = ${workspace}`;
      return rows.length > 0;
    },
    /** Waits for the newest letter to that address and returns the secret in its link. */
    async tokenFor(email: string): Promise<string> {
      for (let attempt = 0; attempt < 50; attempt++) {
        const [row] = await sql<{ body: string }[]>`
          select "text" as body from captured_mail where "to" like ${`%${email}%`} order by received_at desc limit 1`;
        const token = /\/([A-Za-z0-9_-]{43})\b/.exec(row?.body ?? '')?.[1];
        if (token) return token;
        await new Promise((done) => setTimeout(done, 200));
      }
      throw new Error(`No letter with a link came to ${email}`);
    },
    close: () => sql.end(),
  };
}

export type Stored = ReturnType<typeof openStored>;
