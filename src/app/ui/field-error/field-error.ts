import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** What is wrong with a field, beside it and read out. */
@Component({
  selector: 'tm-field-error',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `<span aria-live="polite">{{ text() }}</span>`,
  styles: `
    :host {
      color: var(--stop);
      font-size: 13px;
      line-height: 18px;
    }
    :host:has(span:empty) {
      display: none;
    }
  `,
})
export class FieldError {
  readonly text = input<string | null>(null);
}
