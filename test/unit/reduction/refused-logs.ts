import { Random } from './random';
import type { Refused } from './refused-files';
import { HEADER, logOf, map, sound, utf8 } from './sound-log';

/** Tables whose columns, cells or times make no run. */
export const REFUSED_LOGS: Refused[] = [
  {
    what: 'commas as delimiter and as decimal mark',
    bytes: logOf(sound((cells) => cells.map((cell, i) => (i === 0 ? cell : cell.replace('.', ','))))),
    code: 'comma-twice',
    row: 2,
    says: /semicolons or tabs/,
  },
  {
    what: 'one cell more than the header names',
    bytes: logOf(sound((cells, i) => [String(i + 1), ...cells])),
    code: 'header-mismatch',
    row: 1,
    says: /names 5 columns, but the rows have 6 cells/,
  },
  {
    what: 'one cell fewer than the header names',
    bytes: logOf(sound((cells) => cells.slice(0, 4))),
    code: 'header-mismatch',
    row: 1,
    says: /names 5 columns, but the rows have 4 cells/,
  },
  { what: 'no header', bytes: utf8(sound().join('\n')), code: 'no-time', says: /choose the column/ },
  {
    what: 'no time column',
    bytes: logOf(
      sound((cells) => cells.slice(1)),
      'plate_c,ambient_c,watts,fan_rpm',
    ),
    code: 'no-time',
    row: 1,
    says: /No column holds the time/,
  },
  {
    what: 'no heat-source column',
    bytes: logOf(
      sound((cells) => [cells[0], ...cells.slice(2)]),
      'time_s,ambient_c,watts,fan_rpm',
    ),
    code: 'no-heat-source',
    row: 1,
    says: /Columns found: time_s, ambient_c, watts, fan_rpm/,
  },
  {
    what: 'no ambient column',
    bytes: logOf(
      sound((cells) => [cells[0], cells[1], cells[3]]),
      'time_s,plate_c,watts',
    ),
    code: 'no-ambient',
    row: 1,
    says: /enter a fixed ambient/,
  },
  {
    what: 'two heat sources alike',
    bytes: logOf(
      sound((cells) => [cells[0], cells[1], cells[1], cells[2]]),
      'time_s,core 0 (°C),core 1 (°C),ambient (°C)',
    ),
    code: 'heat-source-unclear',
    row: 1,
    says: /“core 0 \(°C\)”, “core 1 \(°C\)”\. Choose/,
  },
  {
    what: 'the same header twice',
    bytes: logOf(
      sound((cells) => [cells[0], cells[1], cells[1], cells[2]]),
      'time_s,Temp,Temp,ambient_c',
    ),
    code: 'heat-source-unclear',
    row: 1,
    says: /column 2 \(“Temp”\), column 3 \(“Temp”\)/,
  },
  {
    what: 'two ambients alike',
    bytes: logOf(
      sound((cells) => [cells[0], cells[1], cells[2], cells[2]]),
      'time_s,plate_c,ambient 1 (°C),ambient 2 (°C)',
    ),
    code: 'ambient-unclear',
    row: 1,
    says: /2 columns could be the ambient/,
  },
  {
    what: 'an ambient that was never plugged in',
    bytes: logOf(sound((cells) => [cells[0], cells[1], '', cells[3], cells[4]])),
    code: 'ambient-unreadable',
    row: 2,
    column: 'ambient_c',
    says: /its cells are empty/,
  },
  {
    what: 'a heat source of words',
    bytes: logOf(sound((cells) => [cells[0], 'hot', cells[2], cells[3], cells[4]])),
    code: 'no-heat-source',
    row: 1,
    says: /No heat-source column/,
  },
  {
    what: 'a probe that reads 32767',
    bytes: logOf(sound((cells) => [cells[0], '32767', cells[2], cells[3], cells[4]])),
    code: 'heat-source-unreadable',
    row: 2,
    column: 'plate_c',
    says: /row 2 holds “32767”.*check the sensor/,
  },
  {
    what: 'times that never change',
    bytes: logOf(sound((cells) => ['7', ...cells.slice(1)])),
    code: 'no-time',
    row: 1,
    says: /No column holds the time/,
  },
  {
    what: 'a clock that stands still',
    bytes: logOf(
      sound((cells) => ['09:41:00', ...cells.slice(1)]),
      'time,plate_c,ambient_c,watts,fan_rpm',
    ),
    code: 'time-stands-still',
    row: 2,
    column: 'time',
    says: /same in every row/,
  },
  {
    what: 'rows in no order of time',
    bytes: logOf(
      new Random(3).shuffled(sound()).sort((a, b) => (a.length < b.length ? -1 : 0)),
      'elapsed_s,plate_c,ambient_c,watts,fan_rpm',
    ),
    code: 'no-time',
    says: /time/,
  },
  {
    what: 'rows out of order from the middle on',
    bytes: logOf(sound((cells, i) => [String(i > 600 ? (i * 37) % 1300 : i), ...cells.slice(1)])),
    code: 'time-out-of-order',
    column: 'time_s',
    says: /sort the log by time/,
  },
  {
    what: 'a time without unit that reads as half a minute',
    bytes: logOf(
      sound((cells, i) => [(i / 60).toFixed(4), ...cells.slice(1)]),
      'time,plate_c,ambient_c,watts,fan_rpm',
    ),
    code: 'time-unit-unclear',
    row: 1,
    column: 'time',
    says: /time_min/,
  },
  {
    what: 'a stopwatch that may be minutes or hours',
    bytes: logOf(
      sound((cells, i) => [
        `${String(Math.floor(i / 60)).padStart(2, '0')}:${String(i % 60).padStart(2, '0')}`,
        ...cells.slice(1),
      ]),
      'time,plate_c,ambient_c,watts,fan_rpm',
    ),
    code: 'time-unit-unclear',
    row: 1,
    column: 'time',
    says: /21.h.39.min.*21.min.39.s.*mm:ss/,
  },
  {
    what: 'a chosen column that is not there',
    bytes: logOf(sound()),
    columnMap: map(0, 17, 2),
    code: 'column-not-there',
    row: 1,
    says: /Column 18 was asked for, but the log has 5 columns/,
  },
  {
    what: 'words chosen for the time',
    bytes: logOf(
      sound((cells) => [...cells, 'steady']),
      `${HEADER},note`,
    ),
    columnMap: map(5, 1, 2),
    code: 'no-time',
    row: 2,
    column: 'note',
    says: /the first is “steady”/,
  },
  {
    what: 'words chosen for the heat source',
    bytes: logOf(
      sound((cells) => [...cells, 'steady']),
      `${HEADER},note`,
    ),
    columnMap: map(0, 5, 2),
    code: 'heat-source-unreadable',
    row: 2,
    column: 'note',
    says: /Expected numbers for the heat source, but row 2 holds “steady”/,
  },
  {
    what: 'heat source and ambient never in one row nor near',
    bytes: logOf(
      sound((cells, i) =>
        i < 650 ? [cells[0], cells[1], '', cells[3], cells[4]] : [cells[0], '', cells[2], cells[3], cells[4]],
      ),
    ),
    code: 'no-readings-together',
    says: /never read at the same time/,
  },
];
