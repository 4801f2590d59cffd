import { ColumnMap } from '../contracts/run-summary';
import { Candidates, FoundColumns, ROLE_KEYS } from './find-columns';
import { Problems, columnName } from './problems';
import { TableColumn } from './table-column';
import { celsius } from './words';

interface Settled {
  readonly map: Omit<ColumnMap, 'time'>;
  /** Why each column was taken, by position. */
  readonly reasons: Map<number, string>;
}

/** A temperature is told from another by its readings only when they end this far apart, °C. */
const TELLING_DIFFERENCE = 5;

interface Course {
  readonly end: number;
  readonly range: number;
}

/** Mean of the last tenth of a column, and how far it moved. */
function courseOf(values: Float64Array): Course {
  const tail = values.subarray(Math.floor(values.length * 0.9));
  let sum = 0;
  let n = 0;
  let lowest = Infinity;
  let highest = -Infinity;
  for (const value of tail) {
    if (Number.isFinite(value)) {
      sum += value;
      n += 1;
    }
  }
  for (const value of values) {
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
  }
  return { end: n > 0 ? sum / n : NaN, range: highest - lowest };
}

const listed = (columns: readonly TableColumn[]): string =>
  columns
    .slice(0, 6)
    .map((column) => columnName(column.header, column.position))
    .join(', ') + (columns.length > 6 ? ' and others' : '');

/** Settles which column plays which part: by its header where one is named, else by the readings where they tell, else not at all. */
export function settleCandidates(
  found: FoundColumns,
  kept: ReadonlyMap<number, Float64Array>,
  problems: Problems,
  headerRow: number | null,
  chosen: boolean,
): Settled {
  const map: Omit<ColumnMap, 'time'> = { heatSource: null, ambient: null, watts: null, fanSpeed: null };
  const reasons = new Map<number, string>();
  const course = (column: TableColumn) => courseOf(kept.get(column.position) ?? new Float64Array(0));
  const take = (part: Candidates, column: TableColumn, reason: string) => {
    map[ROLE_KEYS[part.role] as keyof typeof map] = column.position;
    reasons.set(column.position, reason);
  };
  const ask = (part: Candidates, contenders: readonly TableColumn[]) => {
    problems.add(
      `${part.role.replace(' ', '-')}-unclear`,
      `${contenders.length} columns could be the ${part.role}: ${listed(contenders)}. Choose the right one.`,
      headerRow,
    );
  };

  const heat = found.parts.get('heat source');
  const ambient = found.parts.get('ambient');
  const ambientNamed =
    ambient && ambient.named && ambient.contenders.length === 1 ? ambient.contenders[0] : null;
  if (heat) {
    const contenders = heat.contenders.filter((column) => column !== ambientNamed);
    if (contenders.length === 1 && (heat.named || chosen)) take(heat, contenders[0], heat.reason);
    else {
      const byEnd = contenders
        .map((column) => ({ column, ...course(column) }))
        .filter(({ end }) => Number.isFinite(end))
        .sort((a, b) => b.end - a.end);
      const [first, second] = byEnd;
      if (
        first &&
        first.range >= TELLING_DIFFERENCE &&
        (!second || first.end - second.end >= TELLING_DIFFERENCE)
      ) {
        const than = second
          ? `, ${celsius(first.end - second.end)} above ${columnName(second.column.header, second.column.position)}`
          : '';
        take(
          heat,
          first.column,
          `Warmest temperature at the end, ${celsius(first.end)}${than}; no header names the heat source.`,
        );
      } else if (contenders.length > 0) ask(heat, contenders);
    }
  }
  if (ambient) {
    const heatAt = map.heatSource;
    const heatEnd = heatAt === null ? NaN : courseOf(kept.get(heatAt) ?? new Float64Array(0)).end;
    const contenders = ambient.contenders.filter((column) => column.position !== heatAt);
    if (contenders.length === 1 && (ambient.named || chosen)) take(ambient, contenders[0], ambient.reason);
    else {
      const calm = contenders.filter((column) => {
        const { end, range } = course(column);
        return range < TELLING_DIFFERENCE && end <= heatEnd - TELLING_DIFFERENCE;
      });
      if (ambient.named ? contenders.length > 1 : calm.length > 1)
        ask(ambient, ambient.named ? contenders : calm);
      else if (calm.length === 1) {
        take(
          ambient,
          calm[0],
          `Stays near ${celsius(course(calm[0]).end)} while the heat source warms up; no header names the ambient.`,
        );
      }
    }
  }
  for (const role of ['watts', 'fan speed'] as const) {
    const part = found.parts.get(role);
    if (!part) continue;
    // A fan header nothing is plugged into reads zero throughout.
    const alive = part.contenders.filter((column) =>
      (kept.get(column.position) ?? new Float64Array(0)).some((value) => value > 0),
    );
    if (part.contenders.length === 1)
      take(part, part.contenders[0], part.named || chosen ? part.reason : `Only column with its unit.`);
    else if (alive.length === 1)
      take(part, alive[0], `Only one of ${part.contenders.length} such columns that is not zero throughout.`);
    else if (alive.length > 1) ask(part, alive);
  }
  return { map, reasons };
}
