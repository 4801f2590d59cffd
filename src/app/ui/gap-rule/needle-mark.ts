import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { NeedleShape } from './gap-rule-pair';

const SPIKE = 'M5 2H13L9 16Z';

/** Each shape on an 18 px square: outlined paths, then filled ones. */
const MARKS: Record<NeedleShape, { readonly hollow: readonly string[]; readonly solid: string }> = {
  solid: { hollow: [], solid: SPIKE },
  half: { hollow: [SPIKE], solid: 'M5 2H9V16Z' },
  hollow: { hollow: [SPIKE], solid: '' },
  broken: { hollow: ['M4.6 2H13.4L11.7 8H6.3Z', 'M7.1 11H10.9L9 16.6Z'], solid: '' },
  'open V': { hollow: ['M5.5 2L9 16L12.5 2'], solid: '' },
  ring: { hollow: ['M13.5 9A4.5 4.5 0 1 1 4.5 9A4.5 4.5 0 1 1 13.5 9Z'], solid: '' },
};

/** The needle of a verdict as a mark before its words, in lists and key lines. The words carry the meaning. */
@Component({
  selector: 'tm-needle-mark',
  template: `
    <svg viewBox="0 0 18 18" width="18" height="18" aria-hidden="true">
      @for (path of paths().hollow; track $index) {
        <path [attr.d]="path" class="hollow" />
      }
      @if (paths().solid; as path) {
        <path [attr.d]="path" class="solid" />
      }
    </svg>
  `,
  styleUrl: './gap-rule-marks.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NeedleMark {
  readonly shape = input.required<NeedleShape>();
  protected readonly paths = computed(() => MARKS[this.shape()]);
}
