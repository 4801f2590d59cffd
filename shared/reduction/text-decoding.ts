interface Signature {
  readonly bytes: readonly number[];
  readonly what: string;
}

/** Beginnings of files that people rename to .csv; common knowledge of file formats. */
const SIGNATURES: readonly Signature[] = [
  { bytes: [0x50, 0x4b, 0x03, 0x04], what: 'a zip archive or a spreadsheet workbook' },
  { bytes: [0xd0, 0xcf, 0x11, 0xe0], what: 'a spreadsheet workbook of the old binary kind' },
  { bytes: [0x1f, 0x8b], what: 'a gzip archive' },
  { bytes: [0x37, 0x7a, 0xbc, 0xaf], what: 'a 7z archive' },
  { bytes: [0x25, 0x50, 0x44, 0x46], what: 'a PDF document' },
  { bytes: [0x89, 0x50, 0x4e, 0x47], what: 'a PNG picture' },
  { bytes: [0xff, 0xd8, 0xff], what: 'a JPEG picture' },
  { bytes: [0x53, 0x51, 0x4c, 0x69, 0x74, 0x65], what: 'a database file' },
];

/** What the first bytes say: an encoding, or what the file is instead of text. */
export type Sniffed = { readonly encoding: string } | { readonly notText: string; readonly archive: boolean };

function decodesAsUtf8(bytes: Uint8Array): boolean {
  try {
    // `stream` lets a character be cut in two by the end of the sample.
    new TextDecoder('utf-8', { fatal: true }).decode(bytes, { stream: true });
    return true;
  } catch {
    return false; // Not valid UTF-8: the caller falls back to Windows-1252, which accepts every byte.
  }
}

/** Tells the encoding of a log from its first bytes; `bytes` may be the whole file. */
export function sniff(bytes: Uint8Array): Sniffed {
  const starts = (mark: readonly number[]) => mark.every((value, i) => bytes[i] === value);
  const found = SIGNATURES.find((signature) => starts(signature.bytes));
  if (found) return { notText: found.what, archive: true };
  if (starts([0xff, 0xfe, 0, 0]) || starts([0, 0, 0xfe, 0xff])) {
    return { notText: 'UTF-32 text', archive: false };
  }
  if (starts([0xef, 0xbb, 0xbf])) return { encoding: 'utf-8' };
  if (starts([0xff, 0xfe])) return { encoding: 'utf-16le' };
  if (starts([0xfe, 0xff])) return { encoding: 'utf-16be' };
  const sample = bytes.subarray(0, 4096);
  const nulls = [0, 0];
  let controls = 0;
  for (let i = 0; i < sample.length; i += 1) {
    if (sample[i] === 0) nulls[i % 2] += 1;
    else if (sample[i] < 9 || (sample[i] > 13 && sample[i] < 32)) controls += 1;
  }
  // Latin text in UTF-16 has a zero in every second byte: the high one.
  const half = sample.length / 2;
  if (nulls[1] > 0.3 * half && nulls[0] < 0.05 * half) return { encoding: 'utf-16le' };
  if (nulls[0] > 0.3 * half && nulls[1] < 0.05 * half) return { encoding: 'utf-16be' };
  if (nulls[0] + nulls[1] + controls > 0.02 * sample.length) {
    return { notText: 'binary data', archive: false };
  }
  return { encoding: decodesAsUtf8(bytes) ? 'utf-8' : 'windows-1252' };
}
