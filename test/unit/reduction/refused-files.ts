import type { ColumnMap } from '../../../shared/contracts';
import { HEADER, logOf, noise, sound, starting, utf8 } from './sound-log';

/** A file that cannot give a run: the first problem must name the place. */
export interface Refused {
  readonly what: string;
  readonly bytes: Uint8Array;
  readonly code: string;
  readonly row?: number;
  readonly column?: string;
  readonly says: RegExp;
  readonly columnMap?: ColumnMap;
}

/** Files that are no tables, or whose table cannot be taken apart. */
export const REFUSED_FILES: Refused[] = [
  { what: 'an empty file', bytes: utf8(''), code: 'empty', says: /empty/ },
  { what: 'blank lines only', bytes: utf8('\n\n  \r\n'), code: 'empty', says: /empty/ },
  {
    what: 'a byte order mark only',
    bytes: Uint8Array.from([0xef, 0xbb, 0xbf]),
    code: 'empty',
    says: /export it again/,
  },
  {
    what: 'a workbook renamed to csv',
    bytes: starting(0x50, 0x4b, 3, 4),
    code: 'not-text',
    says: /zip archive or a spreadsheet workbook.*export.*CSV/i,
  },
  {
    what: 'an old workbook',
    bytes: starting(0xd0, 0xcf, 0x11, 0xe0),
    code: 'not-text',
    says: /old binary kind/,
  },
  { what: 'a gzip archive', bytes: starting(0x1f, 0x8b), code: 'not-text', says: /gzip/ },
  { what: 'a PDF document', bytes: utf8('%PDF-1.7\n%âãÏÓ\n'), code: 'not-text', says: /PDF/ },
  { what: 'a PNG picture', bytes: starting(0x89, 0x50, 0x4e, 0x47), code: 'not-text', says: /PNG/ },
  { what: 'a database file', bytes: utf8('SQLite format 3\0'), code: 'not-text', says: /database/ },
  { what: 'noise', bytes: noise(20_000), code: 'not-text', says: /binary data/ },
  { what: 'zeros', bytes: new Uint8Array(5000), code: 'not-text', says: /binary data/ },
  {
    what: 'UTF-32 text',
    bytes: Uint8Array.from([0xff, 0xfe, 0, 0, 0x74, 0, 0, 0]),
    code: 'not-text',
    says: /UTF-32.*UTF-8/,
  },
  { what: 'a header only', bytes: utf8(`${HEADER}\n`), code: 'no-readings', says: /No rows of readings/ },
  {
    what: 'a header and units only',
    bytes: utf8('time;plate;ambient\ns;°C;°C\n'),
    code: 'no-readings',
    says: /row of numbers for each moment/,
  },
  { what: 'one row', bytes: logOf(sound(undefined, 1)), code: 'one-row', row: 2, says: /Only one row/ },
  {
    what: 'a letter to somebody',
    bytes: utf8('Hello,\nthe logs are attached, as agreed.\nRegards\n'),
    code: 'no-readings',
    says: /time_s, plate_c/,
  },
  {
    what: 'a sign-in page saved as csv',
    bytes: utf8('<!doctype html>\n<html><head><title>Sign in</title></head>\n<body>a, b</body></html>\n'),
    code: 'no-readings',
    says: /No rows of readings/,
  },
  {
    what: 'a JSON file',
    bytes: utf8(
      JSON.stringify(
        {
          readings: [
            { t: 0, plate: 61.2 },
            { t: 1, plate: 61.3 },
          ],
        },
        null,
        1,
      ),
    ),
    code: 'no-readings',
    says: /header such as/,
  },
  {
    what: 'one column',
    bytes: utf8('plate_c\n61.2\n61.3\n61.1\n'),
    code: 'one-column',
    says: /No comma, semicolon or tab/,
  },
  {
    what: 'columns parted by blanks',
    bytes: utf8('time plate ambient\n0 61.2 22.1\n1 61.3 22.1\n'),
    code: 'one-column',
    says: /export it as CSV/,
  },
  {
    what: 'rows quoted as a whole',
    bytes: utf8(
      ['time_s,plate_c,ambient_c', '0,61.2,22.1', '1,61.2,22.1', '2,61.3,22.0']
        .map((line) => `"${line}"`)
        .join('\n'),
    ),
    code: 'rows-in-quotes',
    row: 1,
    says: /outer quotes/,
  },
  {
    what: 'ten thousand columns',
    bytes: utf8(
      [
        Array.from({ length: 10_000 }, (_, i) => `t${i}`),
        ...Array.from({ length: 5 }, () => Array<number>(10_000).fill(1)),
      ]
        .map((row) => row.join(','))
        .join('\n'),
    ),
    code: 'too-many-columns',
    row: 1,
    says: /10,000 columns.*up to 1,000/,
  },
  {
    what: 'a million characters without a line end',
    bytes: utf8('x'.repeat(1_000_000)),
    code: 'one-column',
    says: /No comma/,
  },
  {
    what: 'three million characters without a line end',
    bytes: utf8('x'.repeat(3_000_000)),
    code: 'line-too-long',
    row: 1,
    says: /500,000 characters/,
  },
  {
    what: 'a million characters in one line of a log',
    bytes: logOf(sound((cells, i) => (i === 1250 ? '9'.repeat(1_000_000) : cells))),
    code: 'line-too-long',
    row: 1252,
    says: /line breaks are missing/,
  },
  {
    what: 'a quote never closed among the readings',
    bytes: logOf(sound((cells, i) => (i === 700 ? `${cells[0]},"62.1,22.0,180.0,1200` : cells))),
    code: 'quote-left-open',
    row: 702,
    says: /never closed/,
  },
  {
    what: 'a quote never closed in the header',
    bytes: logOf(sound(), 'time_s,"plate_c,ambient_c,watts,fan_rpm'),
    code: 'quote-left-open',
    row: 1,
    says: /Close or remove it/,
  },
  {
    what: 'a quote never closed in a long log',
    bytes: logOf(sound((cells, i) => (i === 3000 ? `"${cells.join(',')}` : cells), 40_000)),
    code: 'line-too-long',
    row: 3002,
    says: /quote mark may be left open/,
  },
];
