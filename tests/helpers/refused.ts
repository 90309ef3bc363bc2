/** PostgreSQL's error code and constraint of a statement that must fail; Drizzle wraps the error. */
export async function refusedWith(work: Promise<unknown>): Promise<{ code: string; constraint: string }> {
  try {
    await work;
  } catch (error) {
    const cause = (error instanceof Error && error.cause ? error.cause : error) as {
      code?: string;
      constraint_name?: string;
    };
    return { code: cause.code ?? String(error), constraint: cause.constraint_name ?? '' };
  }
  throw new Error('The statement was carried out, but had to be refused');
}
