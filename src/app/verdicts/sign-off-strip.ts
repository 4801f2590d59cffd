import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { Role, Verdict } from '../../../shared/contracts';
import { MomentPipe } from '../ui/moment/moment-pipe';
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

/** The acts that carry a verdict on, by the role whose task they are; the others stand beside them. */
const MAIN_OF: Partial<Record<Act, Role>> = { submit: 'analyst', signOff: 'lead', reRun: 'auditor' };

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
  readonly roles = input.required<readonly Role[]>();
  readonly reRunning = input(false);
  readonly act = output<Act>();

  protected readonly signed = computed(() => signatures(this.verdict()));
  private readonly open = computed(() => ACTS_OF[this.verdict().state]);

  /** Main act last, where the eye ends. A closed act stays away, but for the main one of the reader's role, which says why. */
  protected readonly buttons = computed<ActButton[]>(() => {
    const { may, mayNot } = this.verdict();
    const shown = this.open().filter((act) => may[act]);
    const main = shown.find((act) => MAIN_OF[act] !== undefined) ?? null;
    const closed = this.open().filter((act) => {
      const role = MAIN_OF[act];
      return !may[act] && mayNot[act] && role !== undefined && this.roles().includes(role);
    });
    return [
      ...closed.map((act) => ({ act, label: LABELS[act], main: false, why: mayNot[act] })),
      ...shown.map((act) => ({ act, label: LABELS[act], main: act === main, why: null })),
    ].sort((one, other) => Number(one.main) - Number(other.main));
  });
  protected readonly why = computed(() => this.buttons().find(({ why }) => why !== null)?.why ?? null);

  protected choose({ act, why }: ActButton): void {
    if (why === null && !(act === 'reRun' && this.reRunning())) this.act.emit(act);
  }
}
