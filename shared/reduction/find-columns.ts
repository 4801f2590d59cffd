import { ColumnMap, ColumnRole } from '../contracts/run-summary';
import { AMBIENT, FAN_SPEED, HEAT_SOURCE, RoleWords, WATTS, wordScore } from './column-words';
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

/** A header that only a unit speaks for scores this much: enough to be a contender, not enough to be taken. */
const BY_UNIT_ALONE = 1;
const NAMED = 4;

function scoreOf(column: TableColumn, words: RoleWords, quantity: Quantity): number {
  if (column.mostly === 'text' || column.mostly === 'time') return 0;
  if (column.unit && column.unit.quantity !== quantity) return 0;
  const byWords = wordScore(column.words, words);
  const plain = column.unit ? wordScore(`${column.words} ${column.unit.name}`, words) : byWords;
  if (column.unit)
    return byWords === 0 && plain === 0
      ? barelyUnit(column, words)
      : Math.max(byWords, plain, BY_UNIT_ALONE) + 0.5;
  return byWords >= NAMED ? byWords : byWords > 0 && quantity === 'temperature' ? 0.5 : 0;
}

/** A unit without telling words counts only when no word speaks against the role. */
const barelyUnit = (column: TableColumn, words: RoleWords): number =>
  words.against.test(column.words.toLowerCase()) ? 0 : BY_UNIT_ALONE;

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
        ? `Header “${only.header}” names the ${role}${unitWords(only)}.`
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
