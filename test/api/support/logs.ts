import { createHash } from 'node:crypto';
import type { RunAssignment, Study } from '../../../shared/contracts';
import type { Response } from 'supertest';
import { call, type Agent } from './test-server';

/** A made-up log: twelve minutes at `rise` °C over an ambient of about 22 °C after a short start, a reading every 4 s. */
export function logOf(rise: number, seed: number, { watts = true } = {}): Buffer {
  let state = seed;
  // The minimal standard generator of Park and Miller (1988), from memory: any fixed scatter would do.
  const scatter = (): number => (state = (state * 48271) % 2147483647) / 2147483647 - 0.5;
  for (let warmUp = 0; warmUp < 5; warmUp += 1) scatter();
  const rows = ['Time (s),Heat source (°C),Ambient (°C)' + (watts ? ',Power (W)' : '')];
  for (let second = 0; second < 720; second += 4) {
    const ambient = 22 + 0.1 * scatter();
    const source = ambient + rise - 30 * Math.exp(-second / 15) + 0.2 * scatter();
    const power = watts ? `,${(120 + scatter()).toFixed(1)}` : '';
    rows.push(`${second},${source.toFixed(2)},${ambient.toFixed(2)}${power}`);
  }
  return Buffer.from(`${rows.join('\n')}\n`);
}

export const sha256 = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex');

export interface Drop {
  readonly fileName: string;
  readonly bytes: Buffer;
  readonly assignment: Omit<RunAssignment, 'fileName' | 'digest'>;
}

/** Uploads files as the intake page does: the assignments first, then the files. */
export async function dropLogs(agent: Agent, studyId: string, drops: readonly Drop[]): Promise<Response> {
  const assignments = drops.map(({ fileName, bytes, assignment }) => ({
    fileName,
    digest: sha256(bytes),
    ...assignment,
  }));
  const request = call(agent, 'post', `/api/studies/${studyId}/runs`).field(
    'assignments',
    JSON.stringify(assignments),
  );
  for (const { fileName, bytes } of drops) request.attach('files', bytes, fileName);
  return request;
}

export function place(
  study: Study,
  cooler: number,
  mount: string | null,
  run: string,
  order: number,
): Drop['assignment'] {
  const { id } = study.coolers[cooler] ?? { id: '' };
  return {
    coolerId: id,
    conditionId: study.conditions[0]?.id ?? '',
    mount,
    run,
    order,
    columnMap: null,
    fixedAmbient: null,
    window: null,
  };
}

/** A study of two coolers under one condition, made over the API. */
export async function makeStudy(analyst: Agent, administrator: Agent, name: string): Promise<Study> {
  const bench = await call(administrator, 'post', '/api/benches', { name: `Bench of ${name}` }).expect(200);
  const study = await call(analyst, 'post', '/api/studies', {
    name,
    question: 'Which runs lower?',
    benchId: (bench.body as { id: string }).id,
    compared: ['Coated fins'],
    reference: 'Bare fins',
    conditions: [{ name: 'Stock load', nominalWatts: 120 }],
  }).expect(200);
  return study.body as Study;
}

/**
 * Three mounts of each cooler, `gap` °C apart, mounts a little apart from one another.
 * @param runs how many of each mount
 * @param seed another seed gives other bytes
 */
export function balancedDrops(study: Study, gap: number, { runs = 1, seed = 1 } = {}): Drop[] {
  const drops: Drop[] = [];
  for (const mount of [1, 2, 3])
    for (const cooler of [0, 1])
      for (let run = 1; run <= runs; run += 1) {
        const order = drops.length + 1;
        const rise =
          40 + (cooler === 0 ? gap : 0) + 0.15 * ((mount * 7 + cooler * 3) % 5) + 0.05 * ((order * 5) % 3);
        drops.push({
          fileName: `cooler${cooler}_m${mount}_r${run}.csv`,
          bytes: logOf(rise, 100 * seed + order),
          assignment: place(study, cooler, `Mount ${mount}`, String(run), order),
        });
      }
  return drops;
}
