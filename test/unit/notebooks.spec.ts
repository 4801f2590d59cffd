import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { judge } from '../../shared/judgement';
import { judgementInput, remountedCooler } from '../support/judgement-input';
import { relativeError } from '../support/reference';

interface Notebook {
  readonly cells: readonly { readonly cell_type: string; readonly source: readonly string[] }[];
}

/** Debian's Python, which has SciPy; another Python on the path may not. */
const PYTHON = process.env['TENTHMARK_PYTHON'] ?? '/usr/bin/python3';

function run(name: string): { readonly code: string; readonly result: Record<string, number> } {
  const path = resolve(__dirname, '../../notebooks', name);
  const notebook = JSON.parse(readFileSync(path, 'utf8')) as Notebook;
  const code = notebook.cells
    .filter(({ cell_type }) => cell_type === 'code')
    .map(({ source }) => source.join(''))
    .join('\n');
  const output = execFileSync(PYTHON, ['-'], { input: code, encoding: 'utf8' }).trim();
  return { code, result: JSON.parse(output.slice(output.lastIndexOf('\n') + 1)) as Record<string, number> };
}

/** A list of lists from the notebook's own text, so that both sides judge the same runs. */
function runsOf(code: string, name: string): number[][] {
  const found = new RegExp(`^${name} = (\\[.*\\])$`, 'm').exec(code);
  if (!found) throw new Error(`the notebook has no ${name}`);
  return JSON.parse(found[1]) as number[][];
}

it('two-coolers.ipynb gives the engine’s numbers', () => {
  const { code, result } = run('two-coolers.ipynb');
  const pair = judge(
    judgementInput(
      [
        remountedCooler('Coated fins', runsOf(code, 'coated')),
        remountedCooler('Bare fins', runsOf(code, 'bare')),
      ],
      { thresholds: { confidence: 0.95, power: 0.8, gapThatMatters: 0.5 } },
    ),
  ).pairs[0];
  const engine: Record<string, number | null | undefined> = {
    gap: pair.gap,
    standardError: pair.standardError,
    degreesOfFreedom: pair.degreesOfFreedom,
    marginOfError: pair.marginOfError,
    p: pair.p,
    equivalenceP: pair.equivalence?.p,
    smallestVisibleGap: pair.smallestVisibleGap,
    powerAtGapThatMatters: pair.powerAtGapThatMatters,
    naiveP: pair.naive?.p,
  };
  expect(Object.keys(result).sort()).toEqual(Object.keys(engine).sort());
  const apart = Object.keys(result).filter((key) => !(relativeError(engine[key] ?? NaN, result[key]) < 1e-9));
  expect(apart.map((key) => `${key}: engine ${engine[key]}, notebook ${result[key]}`)).toEqual([]);
});
