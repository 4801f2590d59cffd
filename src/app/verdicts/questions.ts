import { Verdict, VerdictRow } from '../../../shared/contracts';
import { formatMoment } from '../ui/moment/moment-pipe';
import { Question } from './ask-dialog';
import { Act } from './sign-off-strip';
import { VerdictsClient } from './verdicts-client';

/** What is asked before an act that changes a verdict's life, and what is announced after it. */
export function questionFor(
  act: Exclude<Act, 'reRun'>,
  verdict: Verdict,
  headline: string,
  replacements: readonly VerdictRow[],
  client: VerdictsClient,
): { readonly question: Question<Verdict>; readonly done: string } {
  const note = { label: 'A note for the record', required: false };
  const counted = weakInWords(verdict);
  switch (act) {
    case 'submit':
      return {
        done: 'Submitted for sign-off.',
        question: {
          title: 'Submit this verdict for sign-off',
          lines: [headline, counted],
          confirm: 'Submit for sign-off',
          comment: note,
          act: ({ comment }) => client.submit(verdict.id, comment),
        },
      };
    case 'signOff':
      return {
        done: 'Signed off.',
        question: {
          title: 'Sign off this verdict',
          lines: [
            headline,
            counted,
            'A signed-off verdict never changes; it can only be withdrawn with a reason.',
          ],
          confirm: 'Sign off this verdict',
          comment: note,
          act: ({ comment }) => client.signOff(verdict.id, comment),
        },
      };
    case 'sendBack':
      return {
        done: 'Sent back.',
        question: {
          title: 'Send this verdict back',
          lines: [headline],
          confirm: 'Send back with a note',
          comment: { label: 'What should be done first', required: true },
          act: ({ comment }) => client.sendBack(verdict.id, comment ?? ''),
        },
      };
    case 'withdraw':
      return {
        done: 'Withdrawn.',
        question: {
          title: 'Withdraw this verdict',
          lines: [headline, 'It stays in the record, marked withdrawn, with your reason.'],
          confirm: 'Withdraw this verdict',
          comment: { label: 'Why it no longer stands', required: true },
          choice: {
            label: 'Replaced by',
            none: 'nothing yet',
            options: replacements.map((row) => ({
              value: row.id,
              label: `${row.condition.name}, ${row.unit}, judged ${formatMoment(row.judgedAt, new Date())}, ${row.state}`,
            })),
          },
          act: ({ comment, choice }) => client.withdraw(verdict.id, comment ?? '', choice),
        },
      };
  }
}

/** How many findings weaken the verdict, said before it is decided. */
function weakInWords({ cautions }: Verdict): string {
  if (cautions === 0) return 'No finding weakens it.';
  return cautions === 1 ? '1 finding weakens it.' : `${cautions} findings weaken it.`;
}
