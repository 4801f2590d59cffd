import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { AddStudyRequest, Study } from '../../shared/contracts';
import { appendToLedger } from '../audit/ledger-service';
import { BenchEntity } from '../benches/bench-entity';
import { coolerNamed } from '../benches/bench-service';
import { isDuplicate } from '../db/duplicate';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { invalidFields, notFound } from '../http/problem';
import { ConditionEntity, StudyCoolerEntity, StudyEntity } from './study-entity';
import { studyView } from './study-view';

const same = (name: string): string => name.toLowerCase();

/** Names that must differ from those before them, whatever their capitals; says where they don't. */
function doubled(names: readonly { path: string; name: string }[]): { path: string; message: string }[] {
  const seen = new Set<string>();
  return names.flatMap(({ path, name }) => {
    if (seen.has(same(name))) return [{ path, message: `“${name}” is named twice.` }];
    seen.add(same(name));
    return [];
  });
}

function checkNames(request: AddStudyRequest): void {
  const coolers = [...request.compared.map((name, index) => ({ path: `compared.${index}`, name }))];
  const fields = [
    ...doubled([...coolers, { path: 'reference', name: request.reference }]),
    ...doubled(request.conditions.map(({ name }, index) => ({ path: `conditions.${index}.name`, name }))),
  ];
  if (fields.length > 0) throw invalidFields(fields);
}

async function storeStudy(
  manager: EntityManager,
  request: AddStudyRequest,
  caller: Caller,
  at: Date,
): Promise<string> {
  const teamId = caller.team.id;
  if (!(await manager.existsBy(BenchEntity, { id: request.benchId, teamId })))
    throw invalidFields([{ path: 'benchId', message: 'The team has no such bench.' }]);
  const id = randomUUID();
  const { name, question, benchId } = request;
  await manager.insert(StudyEntity, {
    id,
    teamId,
    name,
    question,
    benchId,
    preparedBy: caller.accountId,
    madeAt: at,
  });
  await manager.insert(
    ConditionEntity,
    request.conditions.map((condition, place) => ({ id: randomUUID(), studyId: id, place, ...condition })),
  );
  const names = [...request.compared, request.reference];
  for (const [place, coolerName] of names.entries()) {
    const cooler = await coolerNamed(manager, coolerName, teamId, at);
    const reference = place === names.length - 1;
    await manager.insert(StudyCoolerEntity, { studyId: id, coolerId: cooler.id, place, reference });
  }
  await appendToLedger(manager, {
    teamId,
    at,
    by: caller.name,
    role: 'analyst',
    action: 'study made',
    subject: { kind: 'study', id, name },
    content: { compared: request.compared, reference: request.reference, conditions: request.conditions },
  });
  return id;
}

/** Makes a study; coolers the team does not know yet are added to it. */
export async function addStudy(
  request: AddStudyRequest,
  caller: Caller,
  { db, clock }: Dependencies,
): Promise<Study> {
  checkNames(request);
  try {
    const id = await db.transaction((manager) => storeStudy(manager, request, caller, clock()));
    return await studyView(db.manager, id, caller.team.id);
  } catch (error) {
    if (!isDuplicate(error, 'studies_name')) throw error;
    throw invalidFields([{ path: 'name', message: 'The team already has a study of this name.' }]);
  }
}

/** A study with its coolers and conditions, as the acts on it need them. */
export interface StudyParts {
  readonly study: StudyEntity;
  readonly conditions: readonly ConditionEntity[];
  /** In the order of comparison, the reference last. */
  readonly coolers: readonly { id: string; name: string; reference: boolean }[];
}

/**
 * @param lock hold the study until the transaction ends: acts that change a study's runs come one after another
 * @throws HttpProblem 404 when the team has no such study
 */
export async function findStudy(
  manager: EntityManager,
  id: string,
  teamId: string,
  { lock = false } = {},
): Promise<StudyParts> {
  const study = await manager.findOne(StudyEntity, {
    where: { id, teamId },
    ...(lock ? { lock: { mode: 'pessimistic_write' as const } } : {}),
  });
  if (!study) throw notFound('study');
  const conditions = await manager.find(ConditionEntity, { where: { studyId: id }, order: { place: 'ASC' } });
  const coolers: { id: string; name: string; reference: boolean }[] = await manager.query(
    `select c.id, c.name, sc.reference from study_coolers sc join coolers c on c.id = sc.cooler_id
      where sc.study_id = $1 order by sc.place`,
    [id],
  );
  return { study, conditions, coolers };
}
