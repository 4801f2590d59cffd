import { PairResult, Verdict } from '../../../shared/contracts';
import { formatMoment } from '../ui/moment/moment-pipe';
import { formatLevel, NO_BREAK_SPACE } from '../ui/quantity/quantity-format';

export type VerdictStep = Verdict['steps'][number];

/** Where the verdict stands in its life, for the end of the study line. */
export function stateInWords(
  { state, stateSince }: Pick<Verdict, 'state' | 'stateSince'>,
  now: Date,
): string {
  const since = formatMoment(stateSince, now);
  switch (state) {
    case 'judged':
      return `Judged ${since}, not yet submitted`;
    case 'submitted':
      return `Waiting for a lead’s sign-off since ${since}`;
    case 'sent back':
      return `Sent back ${since}`;
    case 'signed off':
      return `Signed off ${since}`;
    case 'withdrawn':
      return `Withdrawn ${since}`;
  }
}

/** The condition with its nominal load, which is not said twice. */
export function conditionInWords({ name, nominalWatts }: Verdict['condition']): string {
  if (nominalWatts === null) return name;
  const said = new RegExp(`(^|\\D)${nominalWatts}\\s*W\\b`).test(name);
  return said ? name : `${name}, ${nominalWatts}${NO_BREAK_SPACE}W`;
}

interface Counts {
  readonly runs: number;
  readonly mounts: number | null;
}

/** `10 runs, 5 mounts each`, or every cooler's own counts where they differ. */
export function countsInWords(coolers: readonly (Counts & { readonly name: string })[]): string {
  const words = ({ runs, mounts }: Counts): string =>
    mounts === null ? plural(runs, 'run') : `${plural(runs, 'run')}, ${plural(mounts, 'mount')}`;
  const note = coolers.some(({ mounts }) => mounts === null) ? ', mounts not recorded' : '';
  const alike = coolers.every(({ runs, mounts }) => runs === coolers[0].runs && mounts === coolers[0].mounts);
  return alike
    ? `${words(coolers[0])} each${note}`
    : coolers.map((cooler) => `${cooler.name}: ${words(cooler)}`).join('; ') + note;
}

/** `1 run`, `10 runs`. */
export function plural(count: number, noun: string): string {
  return `${count}${NO_BREAK_SPACE}${noun}${count === 1 ? '' : 's'}`;
}

/** How often a set power finds a gap, in words where there are common ones. */
export function oftenInWords(power: number): string {
  if (power === 0.8) return 'four times in five';
  if (power === 0.9) return 'nine times in ten';
  return `in ${formatLevel(power)} of such studies`;
}

/** How far the verdict's evidence reaches. */
export function scopeInWords({ scope }: Pick<PairResult, 'scope'>): string {
  switch (scope) {
    case 'mounts':
      return 'Remounting was measured here and is part of the noise, so the verdict holds for a new fitting of these units.';
    case 'bench history':
      return 'Remounting was not measured here. Its spread comes from this bench’s earlier studies and assumes these coolers mount like those.';
    case 'runs only':
      return 'One mount each: only the scatter between runs is counted. Another fitting may move a cooler by as much as the gap.';
    case null:
      return 'Nothing was judged, so the gap stands for these runs only.';
  }
}

/** The three signatures under a verdict: the newest act of each kind that still stands. */
export interface Signatures {
  readonly prepared: { readonly by: string; readonly at: string; readonly submitted: boolean };
  readonly lead: VerdictStep | null;
  readonly auditor: VerdictStep | null;
}

export function signatures(
  verdict: Pick<Verdict, 'steps' | 'preparedBy' | 'judgedAt' | 'state'>,
): Signatures {
  const newest = (matches: (step: VerdictStep) => boolean): VerdictStep | null =>
    verdict.steps.filter(matches).sort((one, other) => other.at.localeCompare(one.at))[0] ?? null;
  const submitted = newest(({ action }) => action === 'submitted');
  const signed = newest(({ action }) => action === 'signed off');
  const audited = newest(({ action, role }) => action === 're-run' && role === 'auditor');
  const stands = verdict.state !== 'judged' && verdict.state !== 'sent back';
  return {
    prepared:
      submitted && stands
        ? { by: submitted.by, at: submitted.at, submitted: true }
        : { by: verdict.preparedBy, at: verdict.judgedAt, submitted: false },
    lead: signed,
    auditor: signed && audited && audited.at > signed.at ? audited : null,
  };
}

/** The first 16 digits of a digest in fours: enough to compare by eye. */
export function shortDigest(digest: string): string {
  return (digest.slice(0, 16).match(/.{4}/g) ?? []).join(' ');
}
