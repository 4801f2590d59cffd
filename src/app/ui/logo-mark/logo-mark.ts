import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** The letter T as a scale: bar and side ticks in ink, the stem is the needle. Under 20 px the inner ticks go. */
@Component({
  selector: 'tm-logo-mark',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <svg viewBox="0 0 32 32" [attr.width]="size()" [attr.height]="size()" aria-hidden="true">
      <g fill="none" stroke="var(--ink)" stroke-width="2.4">
        <path d="M2 5H30" stroke-width="3" />
        <path d="M3.2 5V12M28.8 5V12" />
        @if (size() >= 20) {
          <path d="M8.6 5V10M23.4 5V10" />
        }
      </g>
      <path d="M12.2 5H19.8L16 30.5Z" fill="var(--spirit)" />
    </svg>
  `,
  styles: ':host { display: inline-flex; }',
})
export class LogoMark {
  readonly size = input(26);
}
