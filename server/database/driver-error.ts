/** The driver's symbolic code (`ER_DUP_ENTRY`, …) of an error that came through Sequelize, or null. Never look at the text. */
export function driverCode(error: unknown): string | null {
  if (typeof error !== 'object' || error === null) return null;
  const carrier = error as { original?: unknown; parent?: unknown; code?: unknown };
  const inner = (carrier.original ?? carrier.parent ?? error) as { code?: unknown };
  return typeof inner.code === 'string' ? inner.code : null;
}

const UNREACHABLE_NAMES = new Set([
  'SequelizeConnectionError',
  'SequelizeConnectionRefusedError',
  'SequelizeConnectionAcquireTimeoutError',
  'SequelizeHostNotReachableError',
]);
const UNREACHABLE_CODES = new Set([
  'ER_SOCKET_UNEXPECTED_CLOSE',
  'ECONNREFUSED',
  'ECONNRESET',
  'ER_UNKNOWN_COM_ERROR',
  '1047',
]);

/** True when the database could not be reached at all, so that the caller may come again: 503 rather than 500. */
export function isDatabaseUnreachable(error: unknown): boolean {
  if (!(error instanceof Error)) return false;
  if (UNREACHABLE_NAMES.has(error.name)) return true;
  const code = driverCode(error);
  return code !== null && UNREACHABLE_CODES.has(code);
}
