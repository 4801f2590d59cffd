import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { NeedleShape } from './gap-rule-pair';
import { NeedleMark } from './needle-mark';

let marksMade = 0;

/** A mark of the gap rule, small, before its name in the key line. */
@Component({
  selector: 'tm-key-mark',
  imports: [NeedleMark],
  template: `
    @switch (mark()) {
      @case ('needle') {
        <tm-needle-mark [shape]="shape()" />
      }
      @case ('bracket') {
        <svg width="26" height="14" aria-hidden="true">
          <path d="M1 11V3H25V11" class="bracket" [class.dashed]="dashed()" />
        </svg>
      }
      @case ('band') {
        <svg width="26" height="14" aria-hidden="true">
          <defs>
            <pattern
              [attr.id]="id"
              width="6"
              height="6"
              patternUnits="userSpaceOnUse"
              patternTransform="rotate(45)"
            >
              <path d="M0 0V6" class="hatch-line" />
            </pattern>
          </defs>
          <rect width="26" height="14" [attr.fill]="'url(#' + id + ')'" />
          <path d="M.6 0V14M25.4 0V14" class="band-end" />
        </svg>
      }
      @case ('notch') {
        <svg width="14" height="14" aria-hidden="true"><path d="M2 1L7 13L12 1" class="notch-line" /></svg>
      }
    }
  `,
  styleUrl: './gap-rule-marks.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class KeyMark {
  readonly mark = input.required<'needle' | 'bracket' | 'band' | 'notch'>();
  readonly shape = input.required<NeedleShape>();
  protected readonly dashed = computed(() => this.shape() === 'broken');
  protected readonly id = `key-hatch-${++marksMade}`;
}
