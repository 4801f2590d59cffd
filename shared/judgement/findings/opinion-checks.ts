import { formatLevel, formatP } from '../quantity-format';
import { finding, listed, PairCheck, quantity } from './finding';

/** The bench's past is known, but too little of it to count. */
export const shortHistory: PairCheck = (checked) => {
  const { pair, input } = checked;
  if (pair.basis !== 'runs' || !input.bench || input.metric !== 'rise') return [];
  return [
    finding(
      'history-too-short',
      'note',
      'Bench’s past',
      `The bench’s past has too few degrees of freedom to say how far remounting moves a reading (${quantity(input.bench.mountSpread, checked)} so far); four are the least.`,
      { ...input.bench },
    ),
  ];
};

/** What the exact permutation test says beside Welch's. */
export const secondOpinion: PairCheck = ({ pair }) => {
  const { permutation } = pair;
  if (!permutation) return [];
  const numbers = { p: permutation.p, arrangements: permutation.arrangements };
  const how = permutation.exact
    ? `all ${permutation.arrangements} ways of dealing the ${pair.unitOfEvidence ?? 'run'}s to the coolers`
    : `${permutation.arrangements} random ways of dealing the ${pair.unitOfEvidence ?? 'run'}s to the coolers`;
  return [
    permutation.agrees
      ? finding(
          'second-opinion',
          'note',
          'Second opinion',
          `Counted over ${how}, the call is the same (p ${formatP(permutation.p)}).`,
          numbers,
        )
      : finding(
          'calls-disagree',
          'caution',
          'Second opinion',
          `Counted over ${how}, the call would be the other one (p ${formatP(permutation.p)}). The gap is too near the edge of the noise to lean on either; add evidence.`,
          numbers,
        ),
  ];
};

/** Single units that stand out or carry the call. */
export const standOut: PairCheck = ({ pair }) => {
  const names = pair.outliers ?? [];
  const driven = pair.trimmed?.agrees === false;
  if (names.length === 0 && !driven) return [];
  const numbers = { outliers: names.length, trimmedP: pair.trimmed?.p ?? null };
  const who =
    names.length === 0
      ? ''
      : `${listed(names)} ${names.length === 1 ? 'stands' : 'stand'} far from the rest. ${names.length === 1 ? 'It counts' : 'They count'} as measured; leaving a run out needs a reason. `;
  const trimmed = driven
    ? `With the furthest fifth of the ${pair.unitOfEvidence ?? 'run'}s at each end set aside the call would be the other one.`
    : '';
  return [finding('stands-out', 'caution', 'Outliers', `${who}${trimmed}`.trim(), numbers)];
};

/** How much evidence would find the gap that matters. */
export const evidenceNeeded: PairCheck = (checked) => {
  const { pair, rules } = checked;
  if (pair.smallestVisibleGap === null || pair.smallestVisibleGap <= rules.gapThatMatters) return [];
  const { unitsNeeded } = pair;
  if (!unitsNeeded) return [];
  const matters = quantity(rules.gapThatMatters, checked);
  const what =
    unitsNeeded.unit === 'mount'
      ? `${unitsNeeded.units} mounts of each cooler (${unitsNeeded.runs} runs)`
      : `${unitsNeeded.units} runs of each cooler`;
  return [
    finding(
      'evidence-needed',
      'note',
      'Evidence needed',
      `If spreads stay as measured, ${what} would find a gap of ${matters} ${Math.round(rules.power * 100)}\u00a0% of the time.`,
      { units: unitsNeeded.units, runs: unitsNeeded.runs },
    ),
  ];
};

/** With several pairs each is held against a stricter level. */
export const severalPairs: PairCheck = ({ pair, rules }) => {
  if (pair.adjustedP === null || pair.adjustedP === undefined) return [];
  return [
    finding(
      'several-coolers',
      'note',
      'Several coolers',
      `So that no false call among all pairs is more likely than the thresholds allow, this pair is held against ${formatLevel(pair.confidence)} confidence instead of ${formatLevel(rules.confidence)} (adjusted p ${formatP(pair.adjustedP)}).`,
      { adjustedP: pair.adjustedP, confidence: pair.confidence },
    ),
  ];
};
