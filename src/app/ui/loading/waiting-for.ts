import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { LoadState } from './load';

/** Under this many milliseconds nothing is shown, so that quick answers do not flicker. */
const PATIENCE = 400;

/** What stands where something fetched will be: nothing, ticks with seconds, or what failed and the next step. */
@Component({
  selector: 'tm-waiting-for',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @let current = load();
    @if (current.state === 'failed') {
      <div class="failed" role="alert">
        <p>
          <b>{{ current.problem.message }}</b> {{ current.problem.detail }}
        </p>
        <button type="button" class="button small" (click)="again.emit()">Try again</button>
      </div>
    } @else if (current.state === 'loading' && seconds() !== null) {
      <div class="loading" role="status">
        <svg width="200" height="24" aria-hidden="true">
          <path
            d="M0.5 0V16M20.5 0V7M40.5 0V7M60.5 0V7M80.5 0V7M100.5 0V11M120.5 0V7M140.5 0V7M160.5 0V7M180.5 0V7M199.5 0V16M0 0.5H200"
          />
        </svg>
        <p>{{ what() }}, {{ seconds() }} s</p>
      </div>
    }
  `,
  styles: `
    .failed {
      display: flex;
      flex-wrap: wrap;
      gap: 10px 16px;
      align-items: center;
      padding: 12px 0;
      border-top: 1px solid var(--stop);
      border-bottom: 1px solid var(--hair);
    }
    b {
      color: var(--stop);
      font-weight: 600;
    }
    .loading {
      padding: 24px 0;
      color: var(--ink-2);
    }
    path {
      fill: none;
      stroke: var(--edge);
    }
  `,
})
export class WaitingFor {
  readonly load = input.required<LoadState<unknown>>();
  /** What is going on, e.g. "Fetching the studies". */
  readonly what = input('Fetching');
  readonly again = output();
  private readonly elapsed = signal(0);
  protected readonly seconds = computed(() =>
    this.elapsed() >= PATIENCE ? Math.max(1, Math.round(this.elapsed() / 1000)) : null,
  );

  constructor() {
    const started = Date.now();
    const timer = setInterval(() => this.elapsed.set(Date.now() - started), PATIENCE);
    inject(DestroyRef).onDestroy(() => clearInterval(timer));
  }
}
