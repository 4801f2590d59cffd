import { ChangeDetectionStrategy, Component } from '@angular/core';
import { ComponentFixture, TestBed } from '@angular/core/testing';
import { plotlyCalls } from '../../../testing/plotly-stub';
import { FigureMaker, Plot } from './plot';
import * as loader from './plotly-loader';
import * as saving from './save-picture';

@Component({
  imports: [Plot],
  template: `<tm-plot [figure]="figure" [height]="200" label="Every run." [points]="points" fileName="runs">
    <table>
      <tbody>
        <tr>
          <td>41.31</td>
        </tr>
      </tbody>
    </table>
  </tm-plot>`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
class Host {
  readonly figure: FigureMaker = (_theme, width) => ({ data: [], layout: { margin: { l: width } } });
  readonly points = [
    { curve: 0, index: 0, words: 'first run' },
    { curve: 2, index: 1, words: 'second run' },
  ];
}

describe('Plot', () => {
  let fixture: ComponentFixture<Host>;
  const page = (): HTMLElement => fixture.nativeElement as HTMLElement;
  const chart = (): HTMLElement => page().querySelector<HTMLElement>('.chart')!;
  const button = (words: string): HTMLButtonElement =>
    [...page().querySelectorAll('button')].find((candidate) => candidate.textContent.trim() === words)!;
  const press = async (key: string): Promise<void> => {
    chart().dispatchEvent(new KeyboardEvent('keydown', { key, cancelable: true }));
    await fixture.whenStable();
  };

  beforeEach(() => jest.clearAllMocks());
  afterEach(() => jest.restoreAllMocks());

  const open = async (): Promise<void> => {
    fixture = TestBed.createComponent(Host);
    await fixture.whenStable();
  };

  it('draws the figure over the template, at its own size', async () => {
    await open();
    expect(plotlyCalls.react).toHaveBeenCalled();
    const [, , layout] = plotlyCalls.react.mock.lastCall as unknown as [
      unknown,
      unknown,
      Record<string, unknown>,
    ];
    expect(layout).toMatchObject({ width: 716, height: 200, margin: { l: 716 }, showlegend: false });
  });

  it('shows the same figures as a table on demand', async () => {
    await open();
    const table = page().querySelector('.table')!;
    expect(table.classList).not.toContain('shown');
    button('Show as table').click();
    await fixture.whenStable();
    expect(table.classList).toContain('shown');
    expect(button('Hide table').getAttribute('aria-expanded')).toBe('true');
  });

  it('steps through the points with arrow keys and reads each out', async () => {
    await open();
    const readOut = (): string => page().querySelector('[aria-live]')!.textContent;
    await press('ArrowRight');
    expect(readOut()).toBe('first run');
    await press('ArrowDown');
    expect(readOut()).toBe('second run');
    expect(plotlyCalls.hover).toHaveBeenLastCalledWith(expect.anything(), [
      { curveNumber: 2, pointNumber: 1 },
    ]);
    await press('ArrowRight');
    expect(readOut()).toBe('first run');
    chart().dispatchEvent(new FocusEvent('blur'));
    await fixture.whenStable();
    expect(readOut()).toBe('');
  });

  it('saves the picture under the name it was given', async () => {
    const save = jest.spyOn(saving, 'savePicture').mockResolvedValue();
    await open();
    button('Save picture').click();
    expect(save).toHaveBeenCalledWith(
      expect.anything(),
      expect.objectContaining({ layout: expect.objectContaining({ height: 200 }) as unknown }),
      'runs',
      document,
    );
  });

  it('shows the table and a way to try again when the library does not arrive', async () => {
    jest.spyOn(loader, 'loadPlotly').mockRejectedValueOnce(new Error('offline'));
    await open();
    expect(page().textContent).toContain('The chart did not load');
    expect(page().querySelector('.table')!.classList).toContain('shown');
    button('Try again').click();
    await fixture.whenStable();
    expect(page().textContent).not.toContain('The chart did not load');
    expect(plotlyCalls.react).toHaveBeenCalled();
  });
});
