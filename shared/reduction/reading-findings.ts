import { ColumnMap, RunFinding } from '../contracts/run-summary';
import { Collector, KeptColumn, OddRow } from './collector';
import type { ReadTable } from './finish-log';
import { columnNames } from './problems';
import { TimeAxis } from './time-axis';
import { count, quoted } from './words';

const rowList = (rows: readonly number[]): string =>
  rows.length === 1 ? `row ${rows[0]}` : `rows ${rows.slice(0, -1).join(', ')} and ${rows[rows.length - 1]}`;

/** Tells of lines that are no readings: a header again, totals at the end, rows cut short. */
function oddRowFindings(collector: Collector): RunFinding[] {
  const findings: RunFinding[] = [];
  const total = collector.readings;
  const note = (code: string, level: RunFinding['level'], text: string) =>
    findings.push({ code, level, text, atSeconds: null });
  const headers = collector.odd.filter((odd) => odd.kind === 'header again');
  if (headers.length > 0) {
    note(
      'header-again',
      'note',
      `The header stands again in ${rowList(headers.slice(0, 5).map((odd) => odd.row))}; left out.`,
    );
  }
  const rest = collector.odd.filter((odd) => odd.kind !== 'header again');
  const atEnd = rest.filter((odd) => odd.after === total);
  const inside = rest.filter((odd) => odd.after < total);
  const cutShort = atEnd.length === 1 && atEnd[0].kind === 'too short' ? atEnd[0] : null;
  if (cutShort) {
    note(
      'last-row-cut',
      'note',
      `The last row, ${cutShort.row}, is cut short; that one reading is left out.`,
    );
  } else if (atEnd.length > 0) {
    note(
      'end-block',
      'note',
      `${count(atEnd.length, 'row')} after the last reading, from row ${atEnd[0].row} (${quoted(atEnd[0].text)}), ${atEnd.length === 1 ? 'is not a reading' : 'are not readings'}; left out.`,
    );
  }
  if (inside.length > 0)
    findings.push(insideFinding(inside, collector.oddCount - headers.length - atEnd.length));
  return findings;
}

function insideFinding(inside: readonly OddRow[], total: number): RunFinding {
  const [first] = inside;
  const why = {
    'no time': 'has no time that can be read',
    'too short': 'has too few cells',
    'too long': 'has more cells than the header',
    'header again': 'repeats the header',
  }[first.kind];
  return {
    code: 'rows-skipped',
    level: 'caution',
    text: `${count(total, 'row')} among the readings skipped; the first, row ${first.row} (${quoted(first.text)}), ${why}.`,
    atSeconds: null,
  };
}

/** Cells of a column that hold no reading: told apart are those that are no number, and those that are empty or say so. */
function cellFindings(
  kept: KeptColumn,
  name: string,
  total: number,
  timeOf: (row: number) => number | null,
): RunFinding[] {
  const findings: RunFinding[] = [];
  if (kept.badCount > 0) {
    const [first] = kept.bad;
    findings.push({
      code: 'bad-cells',
      level: kept.badCount > total / 100 ? 'caution' : 'note',
      text: `${count(kept.badCount, 'cell')} of ${name} ${kept.badCount === 1 ? 'is no reading and is' : 'are no readings and are'} skipped; the first is ${quoted(first.text)} in row ${first.row}.`,
      atSeconds: timeOf(first.row),
    });
  }
  // A column that is filled only every so many rows is a slower sensor, not one that failed.
  if (kept.firstBlank && kept.blankCount <= total / 2) {
    const { row, text } = kept.firstBlank;
    findings.push({
      code: 'blank-cells',
      level: kept.blankCount > total / 20 ? 'caution' : 'note',
      text: `${count(kept.blankCount, 'cell')} of ${name} ${kept.blankCount === 1 ? 'has' : 'have'} no value and ${kept.blankCount === 1 ? 'is' : 'are'} skipped; the first is row ${row}${text === '' ? '' : ` (${quoted(text)})`}.`,
      atSeconds: timeOf(row),
    });
  }
  return findings;
}

/** What reading skipped or noticed, as findings: nothing is left out silently. */
export function readingFindings(
  table: ReadTable,
  collector: Collector,
  map: ColumnMap,
  axis: TimeAxis,
  rows: ArrayLike<number>,
): RunFinding[] {
  const name = columnNames(table.columns);
  const used = new Set<number | null>([map.heatSource, map.ambient, map.watts, map.fanSpeed]);
  const timeOf = (row: number): number | null => {
    for (let i = 0; i < rows.length; i += 1) if (rows[i] === row) return axis.seconds[i];
    return null;
  };
  return oddRowFindings(collector).concat(
    collector.kept
      .filter((kept) => used.has(kept.column.position))
      .flatMap((kept) => cellFindings(kept, name(kept.column), collector.readings, timeOf)),
  );
}
