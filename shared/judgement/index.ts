import { Judgement, JudgementInput } from '../contracts/judgement';
import { judgeByWelch } from './judge';
import { judgeFully } from './judge-fully';

/**
 * Numbered recipes. A change to any number a recipe can give is a new number here; old ones stay, so that a stored verdict can
 * always be re-run as it was.
 */
const METHODS: Readonly<Record<string, (input: JudgementInput) => Judgement>> = {
  'welch-mounts/1': judgeByWelch,
  'welch-runs/1': judgeByWelch,
  'welch-each-pair/1': judgeByWelch,
  'welch-mounts/2': judgeFully,
  'welch-runs/2': judgeFully,
  'welch-history/2': judgeFully,
  'welch-each-pair/2': judgeFully,
};

/** Every method that can be called, newest last. */
export const methodNames: readonly string[] = Object.keys(METHODS);

/** A stored verdict names a method this engine does not have. */
export class UnknownMethod extends Error {
  constructor(readonly method: string) {
    super(`This engine has no method "${method}"; it has ${methodNames.join(', ')}.`);
    this.name = 'UnknownMethod';
  }
}

/**
 * Judges every pair of coolers. Pure: the same input gives the same bits.
 * @param method a numbered recipe; left out, the one that the data call for today
 * @throws UnknownMethod when `method` is not registered
 */
export function judge(input: JudgementInput, method?: string): Judgement {
  if (method === undefined) return judgeFully(input);
  const recipe = METHODS[method];
  if (!recipe) throw new UnknownMethod(method);
  return recipe(input);
}

export { ENGINE_VERSION } from './judge';
export { welchPower } from './welch-power';
export { worstFirst } from './findings';
