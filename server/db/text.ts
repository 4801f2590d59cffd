/** What PostgreSQL takes in no text: NUL, and halves of surrogate pairs standing alone. */
export const UNSTORABLE = /\0|\p{Surrogate}/gu;

/** Whether every text in a value can be stored as it is. */
export function isStorableText(value: unknown): boolean {
  if (typeof value === 'string') return value.search(UNSTORABLE) === -1;
  if (Array.isArray(value)) return value.every(isStorableText);
  if (value !== null && typeof value === 'object') return Object.values(value).every(isStorableText);
  return true;
}
