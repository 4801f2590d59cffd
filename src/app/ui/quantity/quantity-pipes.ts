import { Pipe, PipeTransform } from '@angular/core';
import { decimalsFor, formatInterval, formatNumber, NO_VALUE, Unit } from './quantity-format';

/** A temperature, resistance or spread without sign and unit, for cells under a head that names the unit. */
@Pipe({ name: 'tmQuantity' })
export class QuantityPipe implements PipeTransform {
  transform(value: number | null, unit: Unit, decimals?: number): string {
    return value === null ? NO_VALUE : formatNumber(value, decimals ?? decimalsFor(null, unit));
  }
}

/** Both ends of an interval: `−1.23 to −0.02`; of a mean, without signs, when `signed` is false. */
@Pipe({ name: 'tmInterval' })
export class IntervalPipe implements PipeTransform {
  transform(ends: readonly [number, number] | null, decimals: number, signed = true): string {
    return ends === null ? NO_VALUE : formatInterval(ends, decimals, signed);
  }
}
