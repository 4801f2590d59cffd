import { guessFromName, matchCooler } from '../../../shared/reduction';

describe('what a file name says', () => {
  it.each([
    ['B4-run1.csv', 'B', null, '4', '1'],
    ['coated_m3_r2.csv', 'coated', null, '3', '2'],
    ['bare-fins_stock_mount2_run01.csv', 'bare-fins', 'stock', '2', '1'],
    ['A_1_03.csv', 'A', null, '1', '3'],
    ['bare-fins_raised_m1_r4.csv', 'bare-fins', 'raised', '1', '4'],
    ['Tall fins mount 2 run 3.csv', 'Tall fins', null, '2', '3'],
    ['2026-03-12_coated-fins_120W_M2_R1.txt', 'coated-fins', '120W', '2', '1'],
    ['20260312_0941_coated_run2.csv', 'coated', null, null, '2'],
    ['C1-run2 (1).csv', 'C', null, '1', '2'],
    ['coated.csv', 'coated', null, null, null],
    ['run7.csv', null, null, null, '7'],
    ['007.csv', null, null, null, '7'],
    ['logs\\bench2\\bare_m1_r1.CSV', 'bare', null, '1', '1'],
    ['coated fins raised load m2 r10.tsv', 'coated fins', 'raised load', '2', '10'],
    ['.csv', null, null, null, null],
  ])('%s', (name, cooler, condition, mount, run) => {
    expect(guessFromName(name)).toEqual({ cooler, condition, mount, run });
  });
});

describe('the cooler a token stands for', () => {
  const names = ['Bare fins', 'Coated fins', 'Tall-tower 120'];
  it.each([
    ['bare-fins', 'Bare fins'],
    ['BAREFINS', 'Bare fins'],
    ['coated', 'Coated fins'],
    ['B', 'Bare fins'],
    ['cf', 'Coated fins'],
    ['tower', 'Tall-tower 120'],
    ['talltower120', 'Tall-tower 120'],
    ['coated-fins-v2', 'Coated fins'],
    ['fins', null],
    ['short', null],
    ['', null],
  ])('%s', (token, name) => {
    expect(matchCooler(token, names)).toBe(name);
  });

  it('is nobody’s when two names begin with it', () => {
    expect(matchCooler('b', ['Bare fins', 'Black fins'])).toBeNull();
  });
});
