import { DomainError, ERROR_STATUS, type ErrorCode } from '../../shared/errors.ts';

const TRIGGER_MESSAGES: Partial<Record<ErrorCode, string>> = {
  'stock.not_there': 'The plug is not where this says it is. Scan it again to see its place.',
  'stock.not_enough': 'There are not that many pieces there.',
  'order.not_available': 'These pieces were just promised to another order. Look at what is available now.',
};

/** The domain error that a constraint of the database stands for; null for anything unexpected. */
export function domainErrorOf(error: unknown): DomainError | null {
  const cause = driverErrorIn(error);
  if (!cause) return null;
  if (cause.code === 'SQLITE_CONSTRAINT_TRIGGER') {
    const code = Object.keys(ERROR_STATUS).find((known): known is ErrorCode => known === cause.message);
    return code
      ? new DomainError(code, TRIGGER_MESSAGES[code] ?? cause.message)
      : new DomainError('rule.refused', cause.message);
  }
  if (cause.code === 'SQLITE_CONSTRAINT_UNIQUE' || cause.code === 'SQLITE_CONSTRAINT_PRIMARYKEY') {
    if (cause.message.includes('plug.position')) {
      return new DomainError('rule.refused', 'Another plug already stands at that position.');
    }
    const column = /\.([a-z_]+)$/.exec(cause.message)?.[1] ?? '';
    return new DomainError('record.duplicate', 'This exists already.', {
      fields: [
        {
          path: column.replace(/_([a-z])/g, (_, letter: string) => letter.toUpperCase()),
          message: 'This is taken already.',
        },
      ],
    });
  }
  return null;
}

/** Drizzle wraps the driver's error in one or more `cause`s. */
function driverErrorIn(error: unknown): { code: string; message: string } | null {
  for (let each = error; each instanceof Error; each = each.cause) {
    if ('code' in each && typeof each.code === 'string' && each.code.startsWith('SQLITE_')) {
      return { code: each.code, message: each.message };
    }
  }
  return null;
}
