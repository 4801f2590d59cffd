import { Pipe, PipeTransform } from '@angular/core';

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const two = (value: number): string => String(value).padStart(2, '0');

/** A moment in the reader's own time: `12 Mar 09:41`, with the year when it is not this one. */
export function formatMoment(instant: string, now: Date = new Date()): string {
  const at = new Date(instant);
  return `${formatDay(instant, now)} ${two(at.getHours())}:${two(at.getMinutes())}`;
}

/** The day of a moment: `12 Mar`, with the year when it is not this one. */
export function formatDay(instant: string, now: Date = new Date()): string {
  const at = new Date(instant);
  const year = at.getFullYear() === now.getFullYear() ? '' : ` ${at.getFullYear()}`;
  return `${at.getDate()} ${MONTHS[at.getMonth()]}${year}`;
}

@Pipe({ name: 'tmMoment' })
export class MomentPipe implements PipeTransform {
  transform(instant: string): string {
    return formatMoment(instant);
  }
}

@Pipe({ name: 'tmDay' })
export class DayPipe implements PipeTransform {
  transform(instant: string): string {
    return formatDay(instant);
  }
}
