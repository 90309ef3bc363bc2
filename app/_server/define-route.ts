/**
 * The maker of every route handler: parses path, query and body, checks session and origin, and answers errors as
 * problem details (RFC 9457). Answers are never stored by caches.
 */
import 'server-only';
import { z } from 'zod';
import { err, ok } from '@/lib/result';
import { type Access, admit, asAppError, type Caller, invalidInput } from './boundary';
import { type AppError, type AppResult, appError, statusOf } from './errors';

const DEFAULT_MAX_BYTES = 256 * 1024;
const none = z.object({});

/** With `{ role }` the path must name the workspace: `/w/[workspace]/…` or `/api/w/[workspace]/…`. */
type ParamsFor<A extends Access> = A extends { role: unknown } ? z.ZodType<{ workspace: string }> : z.ZodType;

interface RouteSpec<A extends Access, P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType> {
  name: string;
  access: A;
  params: P;
  /** The query as an object of single texts; of a repeated name the last one counts. */
  query?: Q;
  /** JSON body; only for methods that have one. */
  body?: B;
  maxBytes?: number;
  /** A `Response` is passed on (files, streams), anything else becomes JSON. */
  run(
    context: Caller<A> & { params: z.output<P>; query: z.output<Q>; body: z.output<B>; request: Request },
  ): Promise<AppResult<unknown>>;
}

interface RouteContext {
  params: Promise<Record<string, string | string[] | undefined>>;
}

export function defineRoute<
  const A extends Access,
  P extends ParamsFor<A>,
  Q extends z.ZodType = typeof none,
  B extends z.ZodType = typeof none,
>(spec: RouteSpec<A, P, Q, B>): (request: Request, context: RouteContext) => Promise<Response> {
  return async (request, context) => {
    try {
      const answer = await handle(spec, request, await context.params);
      if (!answer.ok) return problemResponse(answer.error);
      const response = answer.value instanceof Response ? answer.value : Response.json(answer.value ?? null);
      if (!response.headers.has('cache-control')) response.headers.set('cache-control', 'no-store');
      return response;
    } catch (thrown) {
      return problemResponse(await asAppError(thrown, `route ${spec.name}`));
    }
  };
}

async function handle<A extends Access, P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  spec: RouteSpec<A, P, Q, B>,
  request: Request,
  rawParams: Record<string, string | string[] | undefined>,
): Promise<AppResult<unknown>> {
  const reads = request.method === 'GET' || request.method === 'HEAD';
  if (!reads && !isSameOrigin(request)) {
    return err(appError('forbidden', 'This request came from another site and was not carried out.'));
  }
  const params = spec.params.safeParse(rawParams);
  if (!params.success) return err(appError('not_found', 'There is nothing at this address.'));
  const caller = await admit(spec.access, String(rawParams.workspace ?? ''));
  if (!caller.ok) return caller;
  const query = (spec.query ?? none).safeParse(Object.fromEntries(new URL(request.url).searchParams));
  if (!query.success) return err(invalidInput(query.error));
  const rawBody = reads || !spec.body ? ok({}) : await readJson(request, spec.maxBytes ?? DEFAULT_MAX_BYTES);
  if (!rawBody.ok) return rawBody;
  const body = (reads ? none : (spec.body ?? none)).safeParse(rawBody.value);
  if (!body.success) return err(invalidInput(body.error));
  return spec.run({
    ...caller.value,
    params: params.data,
    // A schema that was not given is `none`, which is what Q and B default to.
    query: query.data as z.output<Q>,
    body: body.data as z.output<B>,
    request,
  });
}

/** Browsers send Sec-Fetch-Site; older ones at least Origin with anything but GET. */
function isSameOrigin(request: Request): boolean {
  const site = request.headers.get('sec-fetch-site');
  if (site) return site === 'same-origin';
  const origin = request.headers.get('origin');
  return origin !== null && URL.canParse(origin) && new URL(origin).host === request.headers.get('host');
}

async function readJson(request: Request, maxBytes: number): Promise<AppResult<unknown>> {
  const tooLarge = err(
    appError('too_large', 'This is more than one request may carry. Make it smaller and try again.'),
  );
  if (Number(request.headers.get('content-length') ?? 0) > maxBytes) return tooLarge;
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of request.body ?? []) {
    size += chunk.byteLength;
    if (size > maxBytes) return tooLarge;
    chunks.push(chunk);
  }
  try {
    return ok(JSON.parse(Buffer.concat(chunks).toString('utf8')));
  } catch {
    return err(appError('invalid', 'The body is not JSON.'));
  }
}

/** RFC 9457. `code` is ours; `detail` is the sentence for the person. */
export function problemResponse(error: AppError): Response {
  const { code, message, ...more } = error;
  const headers = new Headers({ 'content-type': 'application/problem+json', 'cache-control': 'no-store' });
  if (error.waitSeconds) headers.set('retry-after', String(error.waitSeconds));
  const status = statusOf[code];
  return new Response(
    JSON.stringify({
      type: 'about:blank',
      title: code.replaceAll('_', ' '),
      status,
      detail: message,
      code,
      ...more,
    }),
    { status, headers },
  );
}
