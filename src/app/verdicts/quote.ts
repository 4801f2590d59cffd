import { ChangeDetectionStrategy, Component, DOCUMENT, inject, input, signal } from '@angular/core';

/** The sentence that may be published, with a button that copies it. */
@Component({
  selector: 'tm-quote',
  template: `
    <p #sentence class="sentence">“{{ text() }}”</p>
    <div class="copy">
      <button type="button" class="button small" (click)="copy(sentence)">Copy sentence</button>
      <span class="caption" aria-live="polite">{{ said() }}</span>
    </div>
  `,
  styleUrl: './quote.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Quote {
  readonly text = input.required<string>();

  protected readonly said = signal('');
  private readonly page = inject(DOCUMENT);

  protected async copy(sentence: HTMLElement): Promise<void> {
    try {
      await this.page.defaultView?.navigator.clipboard.writeText(this.text());
      this.said.set('Copied');
    } catch {
      // A page without the right to the clipboard can still mark the words for the person to copy.
      this.page.getSelection()?.selectAllChildren(sentence);
      this.said.set('Marked; press Ctrl+C');
    }
  }
}
