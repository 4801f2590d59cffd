import { VerdictRow } from '../../../../shared/contracts/verdicts';
import { sharedDomain } from '../../ui/gap-rule';

export type Domains = Readonly<Record<VerdictRow['unit'], number>>;

/** Half-width of the shared scale of a list's small gap rules, for each unit on it. */
export function domainsOf(verdicts: readonly Pick<VerdictRow, 'unit' | 'pairs'>[]): Domains {
  const pairsIn = (unit: VerdictRow['unit']) =>
    verdicts.filter((verdict) => verdict.unit === unit).flatMap(({ pairs }) => pairs);
  return { '°C': sharedDomain(pairsIn('°C'), '°C'), 'K/W': sharedDomain(pairsIn('K/W'), 'K/W') };
}
