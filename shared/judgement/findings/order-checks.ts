import { JudgedCooler } from '../../contracts/judgement';
import { drift, DriftResult, OrderedValue } from '../drift';
import { runsOf } from '../evidence';
import { formatP } from '../quantity-format';
import { CheckedPair, finding, PairCheck, signed } from './finding';

/** From here on order and cooler are too much the same thing to be told apart. */
export const CONFOUNDED = 2;
/** Up to here the coolers count as mixed in the order of testing. */
const MIXED = 1.5;

/** All runs of both coolers with their places; null when any place is unknown. */
export function orderedValues(a: JudgedCooler, b: JudgedCooler): OrderedValue[] | null {
  const values: OrderedValue[] = [];
  for (const [cooler, first] of [
    [a, true],
    [b, false],
  ] as const)
    for (const { order, value } of runsOf(cooler)) {
      if (order === null) return null;
      values.push({ first, order, value });
    }
  return values;
}

/** Whether all runs of one cooler came before all of the other. */
function blocked(values: readonly OrderedValue[]): boolean {
  const of = (first: boolean) => values.filter((value) => value.first === first).map(({ order }) => order);
  return Math.max(...of(true)) < Math.min(...of(false)) || Math.max(...of(false)) < Math.min(...of(true));
}

/** The gap's interval with drift taken out; with mounts its own margin, widened by how much order and cooler overlap. */
export function adjustedMargin({ pair }: Pick<CheckedPair, 'pair'>, result: DriftResult): number {
  const widened = (pair.marginOfError ?? 0) * Math.sqrt(result.varianceInflation);
  return pair.unitOfEvidence === 'mount' ? Math.max(widened, result.adjustedMargin) : result.adjustedMargin;
}

/** Order of testing, drift over it, and what drift could imitate. */
export const orderAndDrift: PairCheck = (checked) => {
  const { pair, a, b, rules } = checked;
  if (pair.gap === null || pair.marginOfError === null) return [];
  const values = orderedValues(a, b);
  if (!values)
    return [
      finding(
        'order-unknown',
        'caution',
        'Order',
        'The order of testing is not recorded for every run, so a slow change in the room or the rig can’t be told from a gap.',
      ),
    ];
  const result = drift(values, rules.confidence);
  if (!result) {
    return blocked(values)
      ? [
          finding(
            'order-not-mixed',
            'caution',
            'Order',
            'All runs of one cooler came before the other, so a slow change in the room or the rig can pass for a gap. Alternate the coolers.',
          ),
        ]
      : [];
  }
  return [orderFinding(checked, result), driftFinding(checked, result)];
};

function orderFinding(checked: CheckedPair, result: DriftResult) {
  const { pair } = checked;
  const inflation = result.varianceInflation;
  const explaining = (pair.gap ?? 0) / result.orderDifference;
  const imitates =
    Math.abs(result.orderDifference) > 1e-9
      ? ` A drift of ${signed(explaining, checked, 1)} per run would explain the whole gap; ${signed(result.slope, checked, 1)} per run was seen.`
      : '';
  const numbers = {
    varianceInflation: inflation,
    orderDifference: result.orderDifference,
    explainingDriftPerRun: Number.isFinite(explaining) ? explaining : null,
  };
  if (inflation < MIXED)
    return finding(
      'order',
      'note',
      'Order',
      'The coolers are mixed in the order of testing, so a slow change in the room can’t pass for a gap.',
      numbers,
    );
  if (inflation < CONFOUNDED)
    return finding(
      'order-half-mixed',
      'caution',
      'Order',
      `The coolers are only partly mixed in the order of testing.${imitates}`,
      numbers,
    );
  return finding(
    'order-not-mixed',
    'caution',
    'Order',
    `One cooler was tested mostly before the other, so order and cooler can hardly be told apart.${imitates} Alternate the coolers.`,
    numbers,
  );
}

function driftFinding(checked: CheckedPair, result: DriftResult) {
  const { pair, rules } = checked;
  const margin = adjustedMargin(checked, result);
  const total = signed(result.slope, checked, 1);
  const numbers = {
    slopePerRun: result.slope,
    slopeP: result.slopeP,
    adjustedGap: result.adjustedGap,
    adjustedMarginOfError: margin,
  };
  const adjusted = `With the drift taken out the gap is ${signed(result.adjustedGap, checked)} ± ${signed(margin, checked).replace('+', '')}`;
  if (result.slopeP >= 1 - rules.confidence || Number.isNaN(result.slopeP))
    return finding(
      'drift',
      'note',
      'Drift',
      `Over the order of testing readings changed by ${total} per run, no more than noise (p ${formatP(result.slopeP)}).`,
      numbers,
    );
  const changes = Math.abs(result.adjustedGap) > margin !== (pair.flag === 'outside noise');
  return finding(
    'drift',
    'caution',
    'Drift',
    `Readings drifted by ${total} per run over the order of testing (p ${formatP(result.slopeP)}). ${adjusted}${changes ? ', which changes the call' : ''}.`,
    numbers,
  );
}
