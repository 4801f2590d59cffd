import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { Verdict } from '../../../shared/contracts';
import { MomentPipe } from '../ui/quantity/moment-format';
import { signatures } from './verdict-words';

export type Act = 'submit' | 'signOff' | 'sendBack' | 'withdraw' | 'reRun';

/** Acts that belong to each step of a verdict's life, the main one first. */
const ACTS_OF: Record<Verdict['state'], readonly Act[]> = {
  judged: ['submit'],
  'sent back': ['submit'],
  submitted: ['signOff', 'sendBack'],
  'signed off': ['reRun', 'withdraw'],
  withdrawn: ['reRun'],
};

const LABELS: Record<Act, string> = {
  submit: 'Submit for sign-off',
  signOff: 'Sign off this verdict',
  sendBack: 'Send back with a note',
  withdraw: 'Withdraw this verdict',
  reRun: 'Re-run from the raw logs',
};

interface ActButton {
  readonly act: Act;
  readonly label: string;
  readonly main: boolean;
  /** Why it can't be done now; the button then explains instead of acting. */
  readonly why: string | null;
}

/** The strip at the bottom: three signature lines and what the reader may do now. */
@Component({
  selector: 'tm-sign-off-strip',
  imports: [MomentPipe],
  templateUrl: './sign-off-strip.html',
  styleUrl: './sign-off-strip.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignOffStrip {
  readonly verdict = input.required<Verdict>();
  readonly reRunning = input(false);
  readonly act = output<Act>();

  protected readonly signed = computed(() => signatures(this.verdict()));
  private readonly open = computed(() => ACTS_OF[this.verdict().state]);

  /** Main act last, where the eye ends. Closed acts stay away, but for sign-off, which says why. */
  protected readonly buttons = computed<ActButton[]>(() => {
    const { may, mayNot } = this.verdict();
    const shown = this.open().filter((act) => may[act]);
    const main = shown.find((act) => act !== 'withdraw' && act !== 'sendBack') ?? null;
    const buttons = shown.map((act) => ({ act, label: LABELS[act], main: act === main, why: null }));
    const explained =
      this.open().includes('signOff') && !may.signOff && may.sendBack && mayNot['signOff']
        ? [{ act: 'signOff' as const, label: LABELS.signOff, main: false, why: mayNot['signOff'] }]
        : [];
    return [...explained, ...buttons].sort((one, other) => Number(one.main) - Number(other.main));
  });
  protected readonly why = computed(() => {
    const explained = this.buttons().find(({ why }) => why !== null);
    if (explained) return explained.why;
    if (this.buttons().length > 0) return null;
    const closed = this.open().find((act) => this.verdict().mayNot[act]);
    return closed ? this.verdict().mayNot[closed] : null;
  });

  protected choose({ act, why }: ActButton): void {
    if (why === null && !(act === 'reRun' && this.reRunning())) this.act.emit(act);
  }
}
