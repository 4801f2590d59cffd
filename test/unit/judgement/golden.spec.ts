import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { JudgementInput, Judgement } from '../../../shared/contracts/judgement';
import { judge, methodNames } from '../../../shared/judgement';
import { GOLDEN_CASES } from '../../golden/cases';

/**
 * Pins every number and every word of every method. A file once kept is never written again: a judgement that comes out
 * different is a new method with a number of its own, whose files are added by `KEEP_GOLDEN=1 npx jest golden`.
 */
const FOLDER = resolve(__dirname, '../../golden');

interface Golden {
  readonly method: string;
  readonly input: JudgementInput;
  readonly judgement: Judgement;
}

const fileOf = (name: string, method: string): string =>
  resolve(FOLDER, method.replace('/', '-'), `${name}.json`);

/** One method of each edition of the rules; the data decide which of an edition's methods a judgement names. */
const EDITIONS = ['welch-mounts/1', 'welch-mounts/2'];

/** What every case comes to under every edition. */
const judged = Object.entries(GOLDEN_CASES).flatMap(([name, input]) =>
  EDITIONS.map((edition) => {
    const judgement = judge(input, edition);
    return { file: fileOf(name, judgement.method), input, judgement };
  }),
);

function keepNew(): void {
  for (const { file, input, judgement } of judged) {
    if (existsSync(file)) continue;
    mkdirSync(resolve(file, '..'), { recursive: true });
    const golden: Golden = { method: judgement.method, input, judgement };
    writeFileSync(file, `${JSON.stringify(golden, null, 1)}\n`);
  }
}

if (process.env['KEEP_GOLDEN']) keepNew();

const kept = readdirSync(FOLDER, { recursive: true, encoding: 'utf8' }).filter((file) =>
  file.endsWith('.json'),
);

it.each(kept)('%s comes out as kept, to the last digit', (file) => {
  const { method, input, judgement } = JSON.parse(readFileSync(resolve(FOLDER, file), 'utf8')) as Golden;
  // Engine versions may differ: what must not differ is what was found.
  const again = { ...judge(input, method), engine: judgement.engine };
  expect(JSON.parse(JSON.stringify(again))).toStrictEqual(judgement);
});

it.each(methodNames)('%s has files, so that a change to it cannot pass unseen', (method) => {
  expect(kept.filter((file) => file.startsWith(method.replace('/', '-')))).not.toHaveLength(0);
});

it('covers every case under every edition', () => {
  expect(judged.map(({ file }) => file).filter((file) => !existsSync(file))).toEqual([]);
});
