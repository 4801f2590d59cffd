import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  inject,
  input,
  signal,
  viewChild,
} from '@angular/core';
import { Condition, StudyCooler } from '../../../../shared/contracts/studies';
import { Assignment } from '../dropped-log';
import { IntakeStore } from '../intake-store';

/** Assigns all selected logs at once; what is left as it is stays. */
@Component({
  selector: 'tm-bulk-bar',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './bulk-bar.html',
  styleUrl: './bulk-bar.scss',
})
export class BulkBar {
  protected readonly store = inject(IntakeStore);
  private readonly first = viewChild.required<ElementRef<HTMLSelectElement>>('cooler');
  readonly coolers = input.required<readonly StudyCooler[]>();
  readonly conditions = input.required<readonly Condition[]>();

  protected readonly coolerId = signal('');
  protected readonly conditionId = signal('');
  protected readonly mount = signal('');
  protected readonly mountMode = signal<'as it is' | 'set' | 'not recorded'>('as it is');
  protected readonly run = signal<'as it is' | 'from file name'>('as it is');
  /** On a phone the fields are a sheet that opens. */
  protected readonly sheet = signal(false);

  focus(): void {
    this.sheet.set(true);
    queueMicrotask(() => this.first().nativeElement.focus());
  }

  protected setMount(text: string): void {
    this.mount.set(text);
    this.mountMode.set(text.trim() === '' ? 'as it is' : 'set');
  }

  protected apply(): void {
    const change: Partial<Record<keyof Assignment, string | null>> = {};
    if (this.coolerId()) change.coolerId = this.coolerId();
    if (this.conditionId()) change.conditionId = this.conditionId();
    if (this.mountMode() === 'set') change.mount = this.mount().trim();
    if (this.mountMode() === 'not recorded') change.mount = null;
    this.store.assign(this.store.selected(), {
      ...(change as Partial<Assignment>),
      runFromName: this.run() === 'from file name',
    });
    this.store.selected.set(new Set());
    this.sheet.set(false);
  }

  protected leaveOut(): void {
    this.store.remove(this.store.selected());
  }
}
