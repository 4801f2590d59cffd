import { NameGuess } from '../contracts/run-summary';

const EXTENSIONS = /(\.(csv|tsv|txt|log|dat|tab|asc|gz))+$/i;
const COPY_MARK = /\s*(\(\d+\)|[-_ ]+copy( \d+)?)$/i;
const DATE =
  /(^|[_\-. ])(20\d{2}[-_.]?\d{2}[-_.]?\d{2}|\d{2}[-_.]\d{2}[-_.]20\d{2})([T_\-. ]?\d{2}[-_.h]?\d{2}([-_.m]?\d{2}s?)?)?(?=$|[_\-. ])/gi;
const RUN = /(^|[_\-. ])(run|rep|repeat|test|lauf|essai|r|t)[_\-. #]?0*(\d+)(?=$|[_\-. ])/i;
const MOUNT = /(^|[_\-. ])(mount|mnt|mounting|fit|paste|montage|m)[_\-. #]?0*(\d+)(?=$|[_\-. ])/i;
const WATTS = /(^|[_\-. ])(\d{2,4}\s?w(?:atts?)?)(?=$|[_\-. ])/i;
const CONDITION_WORDS =
  /^(stock|raised|idle|full|low|high|light|heavy|oc|overclock(ed)?|load|gaming|burn|max|eco|quiet|silent|base)$/i;
const NOISE_WORDS = /^(log|logs|data|results?|csv|export|bench|final|new|raw|trace)$/i;

/** Takes a pattern's number out of the text. */
function takeNumber(text: string, pattern: RegExp): { found: string | null; rest: string } {
  const m = pattern.exec(text);
  return m
    ? { found: m[3], rest: `${text.slice(0, m.index)}${m[1]}_${text.slice(m.index + m[0].length)}` }
    : { found: null, rest: text };
}

/**
 * What a file's name says about its run: `B4-run1.csv` is cooler B, mount 4, run 1; `bare-fins_stock_m2_r01.csv` is
 * cooler bare-fins, condition stock, mount 2, run 1; `A_1_03.csv` is cooler A, mount 1, run 3. Null where it is silent.
 */
export function guessFromName(fileName: string): NameGuess {
  let text = fileName
    .replace(/^.*[/\\]/, '')
    .replace(EXTENSIONS, '')
    .replace(COPY_MARK, '')
    .replace(DATE, '$1');
  const run = takeNumber(text, RUN);
  text = run.rest;
  const mount = takeNumber(text, MOUNT);
  text = mount.rest;
  const watts = WATTS.exec(text);
  let condition = watts ? watts[2].replace(/\s/g, '') : null;
  if (watts) text = text.replace(watts[0], watts[1]);
  // Hyphens join the words of a name where underscores part the fields; else they part the fields too.
  const parts = text
    .split(/_|\.| - /.test(text.replace(/_+$/, '')) ? /[_.]+| - / : /[-\s_]+/)
    .map((part) => part.trim().replace(/^[-\s]+|[-\s]+$/g, ''));
  const words: string[] = [];
  const numbers: string[] = [];
  for (const part of parts) {
    if (part === '' || NOISE_WORDS.test(part)) continue;
    if (/^\d+$/.test(part)) numbers.push(String(Number(part)));
    else words.push(part);
  }
  const conditionAt = words.findIndex((word, i) => i > 0 && CONDITION_WORDS.test(word.split(/[-\s]/)[0]));
  if (condition === null && conditionAt > 0) condition = words.splice(conditionAt, 1)[0];
  else if (condition === null && words.length >= 2) condition = words.splice(1, 1)[0];
  else if (condition === null && words.length === 1) {
    // `coated fins raised load` is one field: its condition begins at the first word that names one.
    const single = words[0].split(/\s+/);
    const at = single.findIndex((word, i) => i > 0 && CONDITION_WORDS.test(word));
    if (at > 0) {
      words[0] = single.slice(0, at).join(' ');
      condition = single.slice(at).join(' ');
    }
  }
  let cooler = words[0] ?? null;
  let guessedMount = mount.found;
  let guessedRun = run.found;
  const lettered = cooler === null ? null : /^([a-z])-?0*(\d{1,2})$/i.exec(cooler);
  if (lettered && guessedMount === null) {
    cooler = lettered[1];
    guessedMount = lettered[2];
  }
  if (guessedMount === null && numbers.length >= 2) guessedMount = numbers.shift() ?? null;
  if (guessedRun === null) guessedRun = numbers.shift() ?? null;
  return { cooler, condition, mount: guessedMount, run: guessedRun };
}

const bare = (text: string): string => text.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '');
const wordsOf = (text: string): string[] =>
  text
    .toLowerCase()
    .split(/[^\p{L}\p{N}]+/u)
    .filter((word) => word !== '');

/**
 * The known name a token stands for, or null when none or more than one fits: the same letters, else the only name that
 * begins with the token (or the token with it), else the only one with these initials, else the only one with this word.
 */
export function matchCooler(token: string, names: readonly string[]): string | null {
  const wanted = bare(token);
  if (wanted === '') return null;
  const tests: ((name: string) => boolean)[] = [
    (name) => bare(name) === wanted,
    (name) =>
      bare(name).startsWith(wanted) ||
      (wanted.length > 2 && bare(name).length > 2 && wanted.startsWith(bare(name))),
    (name) =>
      wordsOf(name)
        .map((word) => word[0])
        .join('') === wanted,
    (name) => wordsOf(name).includes(wanted),
  ];
  for (const test of tests) {
    const fitting = names.filter(test);
    if (fitting.length === 1) return fitting[0];
    if (fitting.length > 1) return null;
  }
  return null;
}
