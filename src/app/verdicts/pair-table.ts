import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { PairResult } from '../../../shared/contracts';
import { needleShape, NeedleMark, NeedleShape } from '../ui/gap-rule';
import { formatRatio } from '../ui/quantity/quantity-format';

interface Cell {
  readonly index: number;
  readonly shape: NeedleShape;
  readonly ratio: string;
  readonly label: string;
  readonly outside: boolean;
}

/** Every pair of more than two coolers by its gap ÷ margin; choosing one shows it above. */
@Component({
  selector: 'tm-pair-table',
  imports: [NeedleMark, RouterLink],
  template: `
    <h2 class="section-head">
      Every pair <small>gap ÷ margin of error; a solid needle is outside noise</small>
    </h2>
    <div class="scroll-sideways">
      <table>
        <thead>
          <tr>
            <th scope="col"><span class="visually-hidden">compared</span></th>
            @for (name of columns(); track name) {
              <th scope="col">{{ name }}</th>
            }
          </tr>
        </thead>
        <tbody>
          @for (row of rows(); track row.name) {
            <tr>
              <th scope="row">{{ row.name }}</th>
              @for (cell of row.cells; track $index) {
                <td [class.current]="cell?.index === current()">
                  @if (cell) {
                    <a
                      routerLink="."
                      [queryParams]="{ pair: cell.index + 1 }"
                      queryParamsHandling="merge"
                      [attr.aria-current]="cell.index === current() ? 'true' : null"
                      [attr.aria-label]="cell.label"
                      [class.outside]="cell.outside"
                    >
                      <tm-needle-mark [shape]="cell.shape" />{{ cell.ratio }}
                    </a>
                  }
                </td>
              }
            </tr>
          }
        </tbody>
      </table>
    </div>
  `,
  styleUrl: './pair-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PairTable {
  readonly pairs = input.required<readonly PairResult[]>();
  readonly headlines = input.required<readonly string[]>();
  readonly coolers = input.required<readonly string[]>();
  /** Place of the pair shown above, in `pairs`. */
  readonly current = input.required<number>();

  protected readonly columns = computed(() => this.coolers().slice(1));
  protected readonly rows = computed(() =>
    this.coolers()
      .slice(0, -1)
      .map((name) => ({ name, cells: this.columns().map((column) => this.cell(name, column)) })),
  );

  private cell(a: string, b: string): Cell | null {
    const index = this.pairs().findIndex((pair) => pair.a === a && pair.b === b);
    if (index < 0) return null;
    const pair = this.pairs()[index];
    const ratio = pair.clearance === null ? 'not judged' : formatRatio(pair.clearance);
    return {
      index,
      ratio,
      shape: needleShape({ ...pair, notJudgedCode: pair.notJudged?.code ?? null }),
      label: `${a} against ${b}: ${this.headlines()[index]}, ${ratio}`,
      outside: pair.flag === 'outside noise',
    };
  }
}
