import { ColumnMap, ColumnRole } from '../contracts/run-summary';
import { AMBIENT, FAN_SPEED, HEAT_SOURCE, RoleWords, WATTS, speaksAgainst, wordScore } from './column-words';
import { FoundTime, findTime, timeIn } from './find-time';
import { TableColumn } from './table-column';
import { Quantity } from './units';

type Reading = Exclude<ColumnRole, 'time'>;

/** Columns that may play a part. One contender: settled by its header; several: the readings have to tell them apart. */
export interface Candidates {
  readonly role: Reading;
  readonly contenders: readonly TableColumn[];
  readonly reason: string;
  /** Whether a header names the part, or only its unit allows it. */
  readonly named: boolean;
}

export interface FoundColumns {
  readonly time: FoundTime | null;
  readonly parts: ReadonlyMap<Reading, Candidates>;
}

const ROLES: readonly { readonly role: Reading; readonly words: RoleWords; readonly quantity: Quantity }[] = [
  { role: 'heat source', words: HEAT_SOURCE, quantity: 'temperature' },
  { role: 'ambient', words: AMBIENT, quantity: 'temperature' },
  { role: 'watts', words: WATTS, quantity: 'power' },
  { role: 'fan speed', words: FAN_SPEED, quantity: 'rotation' },
];

export const ROLE_KEYS: Readonly<Record<ColumnRole, keyof ColumnMap>> = {
  time: 'time',
  'heat source': 'heatSource',
  ambient: 'ambient',
  watts: 'watts',
  'fan speed': 'fanSpeed',
};

/** Parts as sentences call them. */
export const ROLE_NAMES: Readonly<Record<ColumnRole, string>> = {
  time: 'time',
  'heat source': 'heat source',
  ambient: 'ambient',
  watts: 'heat load',
  'fan speed': 'fan speed',
};

/** A header that only a unit speaks for scores this much: enough to be a contender, not enough to be taken. */
const BY_UNIT_ALONE = 1;
const NAMED = 4;

function scoreOf(column: TableColumn, words: RoleWords, quantity: Quantity): number {
  if (column.mostly === 'text' || column.mostly === 'time') return 0;
  if (column.unit && column.unit.quantity !== quantity) return 0;
  const byWords = wordScore(column.words, words);
  if (column.unit) return speaksAgainst(column.words, words) ? 0 : Math.max(byWords, BY_UNIT_ALONE) + 0.5;
  // Without a unit, weak words such as “T1” still make a temperature a contender.
  return byWords >= NAMED || quantity === 'temperature' ? byWords : 0;
}

const unitWords = (column: TableColumn): string =>
  column.unit ? `; unit ${column.unit.name}` : '; no unit is named';

/** Finds which columns may play which part, from headers and units. */
export function findColumns(columns: readonly TableColumn[]): FoundColumns {
  const time = findTime(columns);
  const taken = new Set<number>(time ? [time.source.position, time.source.datePosition ?? -1] : []);
  const parts = new Map<Reading, Candidates>();
  for (const { role, words, quantity } of ROLES) {
    const scored = columns
      .filter((column) => !taken.has(column.position))
      .map((column) => ({ column, score: scoreOf(column, words, quantity) }))
      .filter(({ score }) => score > 0);
    if (scored.length === 0) continue;
    const best = Math.max(...scored.map(({ score }) => score));
    const contenders = scored.filter(({ score }) => score === best).map(({ column }) => column);
    const named = best >= NAMED;
    const [only] = contenders;
    const reason =
      contenders.length === 1 && named
        ? `Header “${only.header}” names the ${ROLE_NAMES[role]}${unitWords(only)}.`
        : 'Several columns fit.';
    parts.set(role, { role, contenders, reason, named });
  }
  return { time, parts };
}

/** The columns a person or a bench has chosen; nothing is recognised beside them. */
export function chosenColumns(columns: readonly TableColumn[], map: ColumnMap): FoundColumns {
  const at = (position: number | null) => (position === null ? undefined : columns[position]);
  const parts = new Map<Reading, Candidates>();
  for (const { role } of ROLES) {
    const column = at(map[ROLE_KEYS[role]]);
    if (column)
      parts.set(role, { role, contenders: [column], reason: `Chosen${unitWords(column)}.`, named: true });
  }
  const timeColumn = at(map.time);
  return { time: timeColumn ? timeIn(timeColumn, columns) : null, parts };
}
