import { Condition, StudyCooler } from '../../../shared/contracts/studies';
import { guessFromName, matchCooler } from '../../../shared/reduction';
import { Assignment } from './dropped-log';

/** Share by which logged power may be off a condition's nominal power and still tell it. */
const POWER_TELLS = 0.15;

/** The same letters and digits, whatever stands between. */
const plain = (text: string): string => text.toLowerCase().replace(/[^a-z0-9]/g, '');

/** The condition whose name or watts the token of a file name gives. */
export function matchCondition(token: string, conditions: readonly Condition[]): Condition | null {
  const wanted = plain(token);
  const watts = /^(\d+)w(atts?)?$/.exec(wanted);
  const found = conditions.filter(
    ({ name, nominalWatts }) =>
      plain(name).startsWith(wanted) || (watts !== null && nominalWatts === Number(watts[1])),
  );
  return found.length === 1 ? found[0] : null;
}

/** What the file's name, and for the condition the logged power, tell about a log. */
export function firstGuess(
  fileName: string,
  coolers: readonly StudyCooler[],
  conditions: readonly Condition[],
): Assignment {
  const guess = guessFromName(fileName);
  const cooler =
    guess.cooler === null
      ? null
      : matchCooler(
          guess.cooler,
          coolers.map(({ name }) => name),
        );
  const condition =
    conditions.length === 1
      ? conditions[0]
      : guess.condition === null
        ? null
        : matchCondition(guess.condition, conditions);
  return {
    coolerId: coolers.find(({ name }) => name === cooler)?.id ?? null,
    conditionId: condition?.id ?? null,
    mount: guess.mount,
    run: guess.run ?? '',
  };
}

/** The condition whose nominal power the log's power is near, when just one is. */
export function conditionByPower(watts: number | null, conditions: readonly Condition[]): string | null {
  if (watts === null) return null;
  const near = conditions.filter(
    ({ nominalWatts }) => nominalWatts !== null && Math.abs(watts / nominalWatts - 1) < POWER_TELLS,
  );
  return near.length === 1 ? near[0].id : null;
}
