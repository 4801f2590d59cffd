import { Pipe, PipeTransform } from '@angular/core';
import {
  decimalsFor,
  formatInterval,
  formatNumber,
  formatPlusMinus,
  formatRatio,
  formatSigned,
  NO_VALUE,
  Unit,
  withUnit,
} from './quantity-format';

/** A gap with sign and unit: `−0.63 °C`. Pass the decimals when gap and margin must agree. */
@Pipe({ name: 'tmGap' })
export class GapPipe implements PipeTransform {
  transform(value: number | null, unit: Unit, decimals?: number): string {
    return value === null
      ? NO_VALUE
      : withUnit(formatSigned(value, decimals ?? decimalsFor(null, unit)), unit);
  }
}

/** A temperature, resistance or spread without sign and unit, for cells under a head that names the unit. */
@Pipe({ name: 'tmQuantity' })
export class QuantityPipe implements PipeTransform {
  transform(value: number | null, unit: Unit, decimals?: number): string {
    return value === null ? NO_VALUE : formatNumber(value, decimals ?? decimalsFor(null, unit));
  }
}

/** A margin of error: `±0.60`. */
@Pipe({ name: 'tmMargin' })
export class MarginPipe implements PipeTransform {
  transform(value: number | null, unit: Unit, decimals?: number): string {
    return value === null ? NO_VALUE : formatPlusMinus(value, decimals ?? decimalsFor(null, unit));
  }
}

/** Gap ÷ margin of error: `1.04×`, never rounded across 1. */
@Pipe({ name: 'tmRatio' })
export class RatioPipe implements PipeTransform {
  transform(clearance: number | null): string {
    return clearance === null ? NO_VALUE : formatRatio(clearance);
  }
}

/** Both ends of an interval: `−1.23 to −0.02`; of a mean, without signs, when `signed` is false. */
@Pipe({ name: 'tmInterval' })
export class IntervalPipe implements PipeTransform {
  transform(ends: readonly [number, number] | null, decimals: number, signed = true): string {
    return ends === null ? NO_VALUE : formatInterval(ends, decimals, signed);
  }
}
