import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { RouterOutlet } from '@angular/router';
import { Preferences } from './core/preferences';

@Component({
  selector: 'tm-root',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterOutlet],
  template: '<router-outlet />',
})
export class App {
  // Applies the chosen theme from the first screen on.
  protected readonly preferences = inject(Preferences);
}
