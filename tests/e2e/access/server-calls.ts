/** Calls server actions as the browser does, without a screen: what is not offered can be asked for all the same. */
import { readFileSync } from 'node:fs';
import type { APIRequestContext } from '@playwright/test';
import { z } from 'zod';

const manifestSchema = z.object({
  node: z.record(
    z.string(),
    z.object({
      filename: z.string(),
      exportedName: z.string(),
      workers: z.record(z.string(), z.unknown()),
    }),
  ),
});

export interface ServerAction {
  /** Where it is written, from the root of the project. */
  file: string;
  name: string;
  /** The identifier that the browser sends. */
  id: string;
  /** The route of a page that has it, such as `/w/[workspace]/kernels`. */
  route: string;
}

/** The route of a page by its file below `app`: groups in brackets are not part of the address. */
export const routeOfFile = (file: string): string =>
  file
    .replace(/^app/, '')
    .replace(/\/(page|route)(\.tsx?)?$/, '')
    .replace(/\/\([^)]*\)/g, '') || '/';

/** Every server action of the product as it was built. */
export function serverActions(): ServerAction[] {
  const manifest = manifestSchema.parse(
    JSON.parse(readFileSync('.next/server/server-reference-manifest.json', 'utf8')),
  );
  return Object.entries(manifest.node).map(([id, { filename, exportedName, workers }]) => {
    const [page] = Object.keys(workers);
    if (!page) throw new Error(`No page has ${exportedName}`);
    return { file: filename, name: exportedName, id, route: routeOfFile(page) };
  });
}

const resultSchema = z.discriminatedUnion('ok', [
  z.object({ ok: z.literal(true), value: z.unknown() }),
  z.object({ ok: z.literal(false), error: z.object({ code: z.string(), message: z.string() }) }),
]);
export type ActionResult = z.infer<typeof resultSchema>;

/** The code of a refusal, or "ok". */
export const codeOf = (result: ActionResult): string => (result.ok ? 'ok' : result.error.code);

export interface ActionCall {
  action: ServerAction;
  /** The address of a page that has the action. */
  path: string;
  input: unknown;
}

/** Posts one action, as the browser's runtime does: the arguments as JSON, the answer as numbered rows. */
export function postAction(request: APIRequestContext, { action, path, input }: ActionCall, origin: string) {
  return request.post(path, {
    headers: {
      'next-action': action.id,
      accept: 'text/x-component',
      'content-type': 'text/plain;charset=UTF-8',
      origin,
    },
    data: JSON.stringify([input]),
    maxRedirects: 0,
  });
}

export async function callAction(
  request: APIRequestContext,
  call: ActionCall,
  origin: string,
): Promise<ActionResult> {
  const response = await postAction(request, call, origin);
  const text = await response.text();
  const rows = new Map(
    text.split('\n').flatMap((row) => {
      const [, number, json] = /^([0-9a-f]+):([{["].*)$/.exec(row) ?? [];
      return number && json ? [[number, json] as const] : [];
    }),
  );
  const envelope = z.object({ a: z.string() }).safeParse(JSON.parse(rows.get('0') ?? 'null'));
  const answer = envelope.success ? rows.get(envelope.data.a.replace('$@', '')) : undefined;
  if (!answer) throw new Error(`${call.action.name} answered ${response.status()}: ${text.slice(0, 400)}`);
  return resultSchema.parse(JSON.parse(answer));
}
