/**
 * The version of the search, told in every certificate. Raise it whenever the exact search, the search before it, presolve or
 * the bounds go through other nodes than before, so that nobody expects nodes to agree that cannot.
 * `tests/unit/solver/engine-version.test.ts` notices.
 */
export const ENGINE_VERSION = 2;
