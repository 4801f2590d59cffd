import { ColumnMap } from '../contracts/run-summary';
import { Candidates, ROLE_KEYS, ROLE_NAMES } from './find-columns';
import type { ReadTable } from './finish-log';
import { columnNames } from './problems';
import { TableColumn } from './table-column';
import { celsius } from './words';

interface Settled {
  readonly map: Omit<ColumnMap, 'time'>;
  /** Why each column was taken, by position. */
  readonly reasons: Map<number, string>;
}

/** A temperature is told from another by its readings only when they end this far apart, °C. */
const TELLING_DIFFERENCE = 5;

/** How a column behaves over the log. */
interface Course {
  readonly column: TableColumn;
  /** Mean of the last tenth. */
  readonly end: number;
  readonly range: number;
}

function courseOf(column: TableColumn, values: Float64Array): Course {
  let sum = 0;
  let n = 0;
  let lowest = Infinity;
  let highest = -Infinity;
  for (const value of values.subarray(Math.floor(values.length * 0.9))) {
    if (Number.isNaN(value)) continue;
    sum += value;
    n += 1;
  }
  for (const value of values) {
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
  }
  return { column, end: n > 0 ? sum / n : NaN, range: highest - lowest };
}

/** Settles which column plays which part: by its header where one is named, else by the readings where they tell, else not at all. */
export function settleCandidates(table: ReadTable, kept: ReadonlyMap<number, Float64Array>): Settled {
  return new Settling(table, kept).settle();
}

class Settling {
  private readonly map: Omit<ColumnMap, 'time'> = {
    heatSource: null,
    ambient: null,
    watts: null,
    fanSpeed: null,
  };
  private readonly reasons = new Map<number, string>();
  private readonly name: (column: TableColumn) => string;

  constructor(
    private readonly table: ReadTable,
    private readonly kept: ReadonlyMap<number, Float64Array>,
  ) {
    this.name = columnNames(table.columns);
  }

  settle(): Settled {
    const { parts } = this.table.found;
    const [heat, ambient] = [parts.get('heat source'), parts.get('ambient')];
    const ambientColumn = ambient?.named && ambient.contenders.length === 1 ? ambient.contenders[0] : null;
    if (heat)
      this.settleHeat(
        heat,
        heat.contenders.filter((column) => column !== ambientColumn),
      );
    if (ambient) this.settleAmbient(ambient);
    for (const role of ['watts', 'fan speed'] as const) {
      const part = parts.get(role);
      if (part) this.settleByLife(part);
    }
    return { map: this.map, reasons: this.reasons };
  }

  private values(column: TableColumn): Float64Array {
    return this.kept.get(column.position) ?? new Float64Array(0);
  }

  private take(part: Candidates, column: TableColumn, reason: string): void {
    this.map[ROLE_KEYS[part.role] as keyof typeof this.map] = column.position;
    this.reasons.set(column.position, reason);
  }

  private ask(part: Candidates, contenders: readonly TableColumn[]): void {
    const list =
      contenders.slice(0, 6).map(this.name).join(', ') + (contenders.length > 6 ? ' and others' : '');
    const what =
      contenders.length === 1
        ? `One column could be the ${ROLE_NAMES[part.role]}, but neither its header nor its readings say so: ${list}. Choose it if it is.`
        : `${contenders.length} columns could be the ${ROLE_NAMES[part.role]}: ${list}. Choose the right one.`;
    this.table.problems.add(`${part.role.replace(' ', '-')}-unclear`, what, this.table.head.headerRow);
  }

  private settleHeat(part: Candidates, contenders: readonly TableColumn[]): void {
    if (contenders.length === 1 && part.named) {
      this.take(part, contenders[0], part.reason);
      return;
    }
    const [first, second] = contenders
      .map((column) => courseOf(column, this.values(column)))
      .filter(({ end }) => Number.isFinite(end))
      .sort((a, b) => b.end - a.end);
    const tells =
      first && first.range >= TELLING_DIFFERENCE && (!second || first.end - second.end >= TELLING_DIFFERENCE);
    if (!tells) {
      if (contenders.length > 0) this.ask(part, contenders);
      return;
    }
    const than = second ? `, ${celsius(first.end - second.end)} above ${this.name(second.column)}` : '';
    this.take(
      part,
      first.column,
      `Warmest temperature at the end, ${celsius(first.end)}${than}; no header alone names the heat source.`,
    );
  }

  private settleAmbient(part: Candidates): void {
    const heatAt = this.map.heatSource;
    const contenders = part.contenders.filter((column) => column.position !== heatAt);
    if (contenders.length === 1 && part.named) {
      this.take(part, contenders[0], part.reason);
      return;
    }
    if (part.named && contenders.length > 1) {
      this.ask(part, contenders);
      return;
    }
    const heat =
      contenders.length > 0 && heatAt !== null
        ? courseOf(this.table.columns[heatAt], this.kept.get(heatAt)!)
        : null;
    if (!heat) return;
    const calm = contenders
      .map((column) => courseOf(column, this.values(column)))
      .filter(({ end, range }) => range < TELLING_DIFFERENCE && end <= heat.end - TELLING_DIFFERENCE);
    if (calm.length === 1) {
      this.take(
        part,
        calm[0].column,
        `Stays near ${celsius(calm[0].end)} while the heat source goes to ${celsius(heat.end)}; no header names the ambient.`,
      );
    } else if (calm.length > 1)
      this.ask(
        part,
        calm.map(({ column }) => column),
      );
  }

  /** A fan header nothing is plugged into, or a supply rail not in use, reads zero throughout. */
  private settleByLife(part: Candidates): void {
    const [only] = part.contenders;
    if (part.contenders.length === 1) {
      this.take(
        part,
        only,
        part.named ? part.reason : `The only column in ${only.unit?.name ?? 'its unit'}.`,
      );
      return;
    }
    const alive = part.contenders.filter((column) => this.values(column).some((value) => value > 0));
    if (alive.length === 1) {
      this.take(
        part,
        alive[0],
        `The only one of ${part.contenders.length} such columns that is not zero throughout.`,
      );
    } else if (alive.length > 1) this.ask(part, alive);
  }
}
