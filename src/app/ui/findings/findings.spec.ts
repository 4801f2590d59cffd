import { TestBed } from '@angular/core/testing';
import { Finding, FindingLevel } from '../../../../shared/contracts';
import { countsInWords } from './consequence';
import { Findings } from './findings';

const finding = (level: FindingLevel, title: string): Finding => ({
  code: title,
  level,
  title,
  text: `${title} was seen.`,
  numbers: {},
});

describe('Findings', () => {
  it('lists what blocks first, then what weakens, then the rest, each with its consequence in words', async () => {
    const fixture = TestBed.createComponent(Findings);
    fixture.componentRef.setInput('findings', [
      finding('note', 'Order'),
      finding('caution', 'Drift'),
      finding('note', 'Load'),
      finding('stop', 'Evidence'),
    ]);
    await fixture.whenStable();
    const items = [...(fixture.nativeElement as HTMLElement).querySelectorAll('li')];
    expect(items.map((item) => item.querySelector('.head')?.textContent)).toEqual([
      'Evidenceblocks sign-off',
      'Driftweakens the verdict',
      'Orderno effect on the verdict',
      'Loadno effect on the verdict',
    ]);
  });

  it('counts in the right number', () => {
    expect(countsInWords([finding('caution', 'Drift')])).toBe('1 weakens the verdict, 0 block sign-off');
    expect(countsInWords([finding('stop', 'A'), finding('caution', 'B'), finding('caution', 'C')])).toBe(
      '2 weaken the verdict, 1 blocks sign-off',
    );
  });
});
