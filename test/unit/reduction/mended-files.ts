import { HEADER, logOf, sound, utf8 } from './sound-log';

/** A log that still gives its run: the finding must say what was skipped or doubtful. */
export interface Mended {
  readonly what: string;
  readonly bytes: Uint8Array;
  readonly code: string;
  readonly says: RegExp;
  readonly readings?: number;
}

export const MENDED: Mended[] = [
  {
    what: 'a letter in a number',
    bytes: logOf(sound((cells, i) => (i === 800 ? [cells[0], '6Z.1', ...cells.slice(2)] : cells))),
    code: 'bad-cells',
    says: /1 cell of “plate_c” is no reading and is skipped; the first is “6Z\.1” in row 802\./,
  },
  {
    what: 'a decimal comma among decimal points',
    bytes: logOf(sound((cells, i) => (i === 800 ? [cells[0], '"62,1"', ...cells.slice(2)] : cells))),
    code: 'bad-cells',
    says: /“62,1” in row 802/,
  },
  {
    what: 'words for no value',
    bytes: logOf(
      sound((cells, i) => (i === 800 || i === 801 ? [cells[0], 'err', ...cells.slice(2)] : cells)),
    ),
    code: 'blank-cells',
    says: /2 cells of “plate_c” have no value and are skipped; the first is row 802 \(“err”\)/,
  },
  {
    what: 'a probe that fell off for a while',
    bytes: logOf(sound((cells, i) => (i > 700 && i < 720 ? [cells[0], '-127.0', ...cells.slice(2)] : cells))),
    code: 'bad-cells',
    says: /19 cells.*“-127\.0” in row 703/,
  },
  {
    what: 'a last row cut short',
    bytes: utf8([HEADER, ...sound(), '1300,62.'].join('\n')),
    code: 'last-row-cut',
    says: /last row, 1302, is cut short/,
    readings: 1300,
  },
  {
    what: 'a row with a cell too many',
    bytes: logOf(sound((cells, i) => (i === 50 ? [cells[0], '', ...cells.slice(1)] : cells))),
    code: 'rows-skipped',
    says: /1 row among the readings skipped; the first, row 52 \(“50”\), has more cells than the header/,
    readings: 1299,
  },
  {
    what: 'a row that lost its end',
    bytes: logOf(sound((cells, i) => (i === 50 ? cells.slice(0, 2) : cells))),
    code: 'rows-skipped',
    says: /row 52.*too few cells/,
    readings: 1299,
  },
  {
    what: 'a remark among the readings',
    bytes: logOf(sound((cells, i) => (i === 50 ? '# fan cleaned' : cells))),
    code: 'rows-skipped',
    says: /row 52 \(“# fan cleaned”\)/,
    readings: 1299,
  },
  {
    what: 'a tail of zeros after a power cut',
    bytes: utf8([HEADER, ...sound()].join('\n') + '\n' + '\0'.repeat(4096)),
    code: 'last-row-cut',
    says: /cut short/,
    readings: 1300,
  },
  {
    what: 'totals at the end that hold numbers everywhere',
    bytes: utf8([HEADER, ...sound(), '0,61.0,22.0,180,1200', '649.5,62.1,22.0,180,1200'].join('\n')),
    code: 'end-block',
    says: /From row 1302 on the time falls back.*2 rows left out/,
    readings: 1300,
  },
  {
    what: 'a log begun anew',
    bytes: logOf([...sound().slice(0, 400), ...sound()]),
    code: 'restart',
    says: /starts again at row 402, after 6 min 39 s\. Only the 1,300 readings.*the 400 readings before are not/,
  },
  {
    what: 'newest reading first',
    bytes: logOf(sound().reverse()),
    code: 'newest-first',
    says: /newest reading first/,
    readings: 1300,
  },
  {
    what: 'a clock set back',
    bytes: logOf(sound((cells, i) => [String(i > 600 ? 5000 + i - 30 : 5000 + i), ...cells.slice(1)])),
    code: 'clock-set-back',
    says: /goes back by 29 s at row 603/,
    readings: 1300,
  },
  {
    what: 'a logger that was off',
    bytes: logOf(sound().filter((_, i) => i < 100 || i > 146)),
    code: 'time-gap',
    says: /48 s without readings, from 1:39\. The steady window is missing 48 s/,
  },
  {
    what: 'five minutes only',
    bytes: logOf(sound(undefined, 300)),
    code: 'short-log',
    says: /lasts 4 min 59 s; a steady window needs 10 minutes/,
  },
  {
    what: 'a clock written to the minute',
    bytes: logOf(
      sound((cells, i) => [`09:${String(Math.floor(i / 60) + 10)}`, ...cells.slice(1)]),
      'time,plate_c,ambient_c,watts,fan_rpm',
    ),
    code: 'coarse-clock',
    says: /only every 60 s/,
    readings: 1300,
  },
  {
    what: 'uneven steps',
    bytes: logOf(sound((cells, i) => [String(i * 2 + (i % 3 === 0 ? 1.4 : 0)), ...cells.slice(1)])),
    code: 'time-weighted',
    says: /each counts for the time it stands for/,
  },
  {
    what: 'heat source and ambient swapped',
    bytes: logOf(sound(), 'time_s,ambient_c,plate_c,watts,fan_rpm'),
    code: 'rise-not-positive',
    says: /40\.0 °C below ambient.*swapped/,
  },
  {
    what: 'a heater that reports no watts',
    bytes: logOf(sound((cells) => [...cells.slice(0, 3), '0', cells[4]])),
    code: 'no-heat-load',
    says: /reads 0\.0 W/,
  },
  {
    what: 'a fan that stops',
    bytes: logOf(sound((cells, i) => (i > 900 ? [...cells.slice(0, 4), '0'] : cells))),
    code: 'fan-off',
    says: /reads 0 rpm at 15:01/,
  },
  {
    what: 'a room that warms up',
    bytes: logOf(
      sound((cells, i) => [
        cells[0],
        (62 + i / 500).toFixed(1),
        (22 + i / 500).toFixed(1),
        ...cells.slice(3),
      ]),
    ),
    code: 'ambient-moved',
    says: /moved 2\.6 °C inside the steady window, from 22\.0 °C to 24\.6 °C/,
  },
  {
    what: 'an ambient logger that died',
    bytes: logOf(sound((cells, i) => (i > 1000 ? [cells[0], cells[1], '', ...cells.slice(3)] : cells))),
    code: 'ambient-lost',
    says: /No ambient for 299 readings between 16:41 and 21:39/,
  },
  {
    what: 'a probe that sticks',
    bytes: logOf(
      sound((cells, i) => [cells[0], i < 400 ? (53 + i / 40).toFixed(1) : '63.0', ...cells.slice(2)]),
    ),
    code: 'sensor-stuck',
    says: /one and the same value from 6:38 to 21:39.*steps of 0\.1 °C.*may be stuck/,
  },
  {
    what: 'a probe of whole degrees',
    bytes: logOf(sound((cells, i) => [cells[0], String(62 + (i % 2)), ...cells.slice(2)])),
    code: 'sensor-coarse',
    says: /steps of 1\.0 °C/,
  },
];
