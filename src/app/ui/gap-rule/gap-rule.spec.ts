import { ChangeDetectionStrategy, Component, signal } from '@angular/core';
import { ComponentFixture, TestBed } from '@angular/core/testing';
import { GapRule } from './gap-rule';
import { FIN_PAIR } from './gap-rule-fixtures';
import { GapRulePair } from './gap-rule-pair';

@Component({
  imports: [GapRule],
  template: `<tm-gap-rule [pair]="pair()" [gapThatMatters]="0.5" [name]="name" flag
    ><h1>Headline</h1></tm-gap-rule
  >`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
class Host {
  readonly pair = signal<GapRulePair | null>(FIN_PAIR);
  readonly name = 'Outside noise, only just';
}

describe('GapRule', () => {
  let fixture: ComponentFixture<Host>;
  const page = (): HTMLElement => fixture.nativeElement as HTMLElement;
  const keyText = (): string[] =>
    [...page().querySelectorAll('dl > div')].map((row) => row.textContent.replace(/\s+/g, ' ').trim());

  beforeEach(async () => {
    fixture = TestBed.createComponent(Host);
    await fixture.whenStable();
  });

  it('is a picture with the headline for name and the figures for description', () => {
    const svg = page().querySelector('svg[role=img]');
    expect(
      document.getElementById(svg!.getAttribute('aria-labelledby')!) ?? page().querySelector('title'),
    ).toBeTruthy();
    expect(page().querySelector('title')?.textContent).toBe('Outside noise, only just');
    expect(page().querySelector('desc')?.textContent).toContain('Coated fins minus Bare fins');
    expect(page().querySelector('desc')?.textContent).toContain('stands outside the noise band');
  });

  it('says every mark in the key line', () => {
    expect(keyText()).toEqual([
      'measured gap \u22120.63 °C',
      '95% interval \u22121.23 to \u22120.02 °C',
      'noise, as margin of error ±0.60 °C',
      'smallest gap that matters ±0.50 °C',
      'one tick 0.1 °C',
    ]);
  });

  it('keeps gap and margin apart in the key when they would round to the same', async () => {
    fixture.componentInstance.pair.set({
      ...FIN_PAIR,
      gap: -0.6021,
      marginOfError: 0.5986,
      interval: [-1.2007, -0.0035],
    });
    await fixture.whenStable();
    expect(keyText().slice(0, 3)).toEqual([
      'measured gap \u22120.602 °C',
      '95% interval \u22121.201 to \u22120.004 °C',
      'noise, as margin of error ±0.599 °C',
    ]);
  });

  it('shows no needle while nothing is measured, and names what the notches mean', async () => {
    fixture.componentInstance.pair.set(null);
    await fixture.whenStable();
    expect(page().querySelector('.needle')).toBeNull();
    expect(keyText()).toEqual(['smallest gap that matters ±0.50 °C', 'one tick 0.1 °C']);
    expect(page().querySelector('h1')?.textContent).toBe('Headline');
  });

  it('says that noise was not measured instead of drawing a band', async () => {
    fixture.componentInstance.pair.set({
      ...FIN_PAIR,
      gap: 0.38,
      marginOfError: null,
      interval: null,
      flag: 'not judged',
      notJudgedCode: 'single run each',
    });
    await fixture.whenStable();
    expect(page().querySelector('rect[height="34"]')).toBeNull();
    expect(page().querySelector('circle')).not.toBeNull();
    expect(keyText()).toContain('noise, as margin of error not measured');
  });
});
