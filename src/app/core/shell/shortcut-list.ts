import {
  AfterViewInit,
  ChangeDetectionStrategy,
  Component,
  computed,
  ElementRef,
  inject,
  output,
  viewChild,
} from '@angular/core';
import { Session } from '../session';
import { placesFor } from './places';

/** The list of keys, under `?`. */
@Component({
  selector: 'tm-shortcut-list',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <dialog #dialog aria-labelledby="shortcut-list-head" (close)="closed.emit()">
      <h2 class="section-head" id="shortcut-list-head">Keys</h2>
      <dl>
        @for (place of places(); track place.path) {
          <div>
            <dt>
              <kbd>g</kbd> <kbd>{{ place.key }}</kbd>
            </dt>
            <dd>go to {{ place.name }}</dd>
          </div>
        }
        <div>
          <dt><kbd>/</kbd></dt>
          <dd>find a study</dd>
        </div>
        <div>
          <dt><kbd>j</kbd> <kbd>k</kbd></dt>
          <dd>next, previous log in Intake</dd>
        </div>
        <div>
          <dt><kbd>x</kbd></dt>
          <dd>select the log; with Shift a range</dd>
        </div>
        <div>
          <dt><kbd>e</kbd></dt>
          <dd>edit the selected logs</dd>
        </div>
        <div>
          <dt><kbd>?</kbd></dt>
          <dd>this list</dd>
        </div>
      </dl>
      <p class="caption">Single-letter keys can be switched off under your account.</p>
      <form method="dialog"><button class="button" type="submit">Close the list</button></form>
    </dialog>
  `,
  styles: `
    dialog {
      width: min(420px, calc(100vw - 32px));
      padding: 20px 24px;
      border: 1px solid var(--edge);
      border-radius: 4px;
      background: var(--plate);
      color: var(--ink);
    }
    dialog::backdrop {
      background: rgb(0 0 0 / 40%);
    }
    dl div {
      display: grid;
      grid-template-columns: 96px 1fr;
      padding: 6px 0;
      border-top: 1px solid var(--hair);
    }
    .caption {
      margin: 10px 0 14px;
    }
  `,
})
export class ShortcutList implements AfterViewInit {
  private readonly session = inject(Session);
  private readonly dialog = viewChild.required<ElementRef<HTMLDialogElement>>('dialog');
  protected readonly places = computed(() => placesFor(this.session.roles()));
  readonly closed = output();

  ngAfterViewInit(): void {
    this.dialog().nativeElement.showModal();
  }
}
