import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';
import { UNSTORABLE } from './text';

/** A value can't be stored as JSON without changing it. */
export class NotStorable extends Error {}

/**
 * A copy of a value as `jsonb` gives it back: −0 becomes 0, undefined members vanish, and characters PostgreSQL
 * refuses become U+FFFD. Comparing and hashing go by this form, so that what is stored is what was hashed.
 * @throws NotStorable on NaN or an infinite number, which JSON would silently turn into null
 */
export function storable<T>(value: T, path = ''): T {
  return copy(value, path) as T;
}

function copy(value: unknown, path: string): unknown {
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new NotStorable(`${path || 'The value'} is ${value}.`);
    return value === 0 ? 0 : value;
  }
  if (typeof value === 'string') return value.replace(UNSTORABLE, '\uFFFD');
  if (Array.isArray(value)) return value.map((one, index) => copy(one, `${path}[${index}]`));
  if (value !== null && typeof value === 'object') {
    return Object.fromEntries(
      Object.entries(value)
        .filter(([, member]) => member !== undefined)
        .map(([name, member]) => [name, copy(member, path ? `${path}.${name}` : name)]),
    );
  }
  return value;
}

/** SHA-256 of a value's canonical JSON (RFC 8785), hexadecimal. */
export function digestOf(value: unknown): string {
  return createHash('sha256')
    .update(canonicalize(storable(value)) ?? 'null', 'utf8')
    .digest('hex');
}
