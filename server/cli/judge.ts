import { readFileSync } from 'node:fs';
import { dirname, resolve } from 'node:path';
import { Finding, JudgedCooler, Judgement } from '../../shared/contracts/judgement';
import { judge, worstFirst } from '../../shared/judgement';
import { BadRequest, JudgeRequest, parseRequest } from './judging/judge-request';
import { readRun } from './judging/read-run';

/**
 * The judge command: a request in, a judgement out, no server and no database.
 * @param argv the request's file name, or `-` for standard input
 * @returns exit code: 0, or 2 with one line on standard error when the request or a log of it can't be used
 */
export async function main(argv: readonly string[]): Promise<number> {
  try {
    const [file] = argv;
    if (argv.length !== 1 || file === undefined)
      throw new BadRequest('Usage: npm run -s judge -- request.json   (or - for standard input)');
    const { text, name, folder } = readRequest(file);
    const request = parseRequest(text, name);
    const noticed: Finding[] = [];
    const coolers = await readCoolers(request, folder, (finding) => noticed.push(finding));
    const judgement = judge({
      metric: request.metric,
      thresholds: request.thresholds,
      bench: request.bench ?? null,
      nominalWatts: request.nominalWatts ?? null,
      seed: request.seed,
      coolers,
      leftOut: [],
    });
    process.stdout.write(`${JSON.stringify(answer(judgement, request, coolers, noticed), null, 2)}\n`);
    return 0;
  } catch (error) {
    if (!(error instanceof BadRequest)) throw error;
    process.stderr.write(`${error.message}\n`);
    return 2;
  }
}

function readRequest(file: string): { text: string; name: string; folder: string } {
  if (file === '-') return { text: readFileSync(0, 'utf8'), name: 'standard input', folder: process.cwd() };
  try {
    return { text: readFileSync(file, 'utf8'), name: file, folder: dirname(resolve(file)) };
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    throw new BadRequest(`${file}: ${code === 'ENOENT' ? 'no such file' : (error as Error).message}`);
  }
}

async function readCoolers(
  request: JudgeRequest,
  folder: string,
  tell: (finding: Finding) => void,
): Promise<JudgedCooler[]> {
  const place = { folder, metric: request.metric, nominalWatts: request.nominalWatts ?? null, tell };
  const coolers: JudgedCooler[] = [];
  for (const cooler of request.coolers) {
    const mounts: JudgedCooler['mounts'] = [];
    for (const [index, mount] of (cooler.mounts ?? [{ name: '', runs: cooler.runs ?? [] }]).entries()) {
      const runs = [];
      for (const [number, run] of mount.runs.entries())
        runs.push(await readRun(run, { ...place, name: String(number + 1) }));
      mounts.push({ name: mount.name ?? String(index + 1), runs });
    }
    coolers.push({ name: cooler.name, mountsRecorded: cooler.mounts !== undefined, mounts });
  }
  return coolers;
}

/** The judgement as the command tells it: the engine's own, words put beside each pair. */
function answer(
  judgement: Judgement,
  request: JudgeRequest,
  coolers: readonly JudgedCooler[],
  noticed: readonly Finding[],
) {
  const noWatts = coolers.every(({ mounts }) =>
    mounts.every(({ runs }) => runs.every(({ watts }) => watts === null)),
  );
  const inKelvinsPerWatt: Finding = {
    code: 'gap-that-matters-unit',
    level: 'note',
    title: 'Gap that matters',
    text: 'No watts are known, so the gap that matters was read in K/W as given.',
    numbers: { gapThatMatters: request.thresholds.gapThatMatters },
  };
  const findings = worstFirst([
    ...judgement.findings,
    ...noticed,
    ...(request.metric === 'resistance' && noWatts ? [inKelvinsPerWatt] : []),
  ]);
  return {
    ...judgement,
    words: undefined,
    ranking: judgement.several?.ranking ?? null,
    pairs: judgement.pairs.map((pair, index) => ({
      ...pair,
      power: pair.powerAtGapThatMatters,
      permutationP: pair.permutation?.p ?? null,
      runsNeeded: pair.unitsNeeded?.runs ?? null,
      ...judgement.words[index],
    })),
    findings,
  };
}
