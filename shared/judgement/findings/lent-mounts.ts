import { Finding } from '../../contracts/judgement';
import { showsRemounting } from '../evidence';
import { formatNumber } from '../quantity-format';
import { CheckedPair, finding, quantity } from './finding';

/** Where the noise of remounting was taken from, and what that assumes. */
export function lentMounts(checked: CheckedPair): Finding[] {
  const { pair, a, b, input } = checked;
  if (pair.basis === 'borrowed mounts') {
    const [several, single] = showsRemounting(a) ? [a.name, b.name] : [b.name, a.name];
    return [
      finding(
        'borrowed-mounts',
        'caution',
        'Mounts',
        `${single} was fitted once; its noise of remounting is taken to be that of ${several}. If ${single} is fussier to fit, the margin of error is too small. Remount it and record it.`,
        { degreesOfFreedom: pair.degreesOfFreedom },
      ),
    ];
  }
  const { mountSpread, mountSpreadDegreesOfFreedom } = input.bench ?? {
    mountSpread: NaN,
    mountSpreadDegreesOfFreedom: NaN,
  };
  const once =
    a.mountsRecorded && b.mountsRecorded
      ? 'Each cooler was fitted once'
      : 'Mounts were not recorded, so each cooler counts as fitted once';
  const tipping =
    pair.tippingMountSpread === null || pair.tippingMountSpread === undefined
      ? ''
      : ` By the runs alone the gap would count up to a spread of ${quantity(pair.tippingMountSpread, checked)}.`;
  return [
    finding(
      'bench-history',
      'caution',
      'Mounts',
      `${once}. How far remounting moves a reading is taken from the bench’s past: ${quantity(mountSpread, checked)} (SD of mount means, ${formatNumber(mountSpreadDegreesOfFreedom, 0)} degrees of freedom). That assumes both mount like the others.${tipping}`,
      { mountSpread, mountSpreadDegreesOfFreedom, tippingMountSpread: pair.tippingMountSpread },
    ),
  ];
}
