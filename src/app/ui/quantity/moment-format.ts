import { Pipe, PipeTransform } from '@angular/core';

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** `today 09:41`, `12 Mar 09:41`, and with the year when it is not this one; in the reader's time zone. */
export function formatMoment(instant: string, now: Date): string {
  const at = new Date(instant);
  const time = `${two(at.getHours())}:${two(at.getMinutes())}`;
  return at.toDateString() === now.toDateString() ? `today ${time}` : `${formatDay(instant, now)} ${time}`;
}

/** `12 Mar`, and with the year when it is not this one. */
export function formatDay(instant: string, now: Date): string {
  const at = new Date(instant);
  const day = `${at.getDate()} ${MONTHS[at.getMonth()]}`;
  return at.getFullYear() === now.getFullYear() ? day : `${day} ${at.getFullYear()}`;
}

function two(value: number): string {
  return String(value).padStart(2, '0');
}

/** A moment as people say it. */
@Pipe({ name: 'tmMoment' })
export class MomentPipe implements PipeTransform {
  transform(instant: string): string {
    return formatMoment(instant, new Date());
  }
}

/** A day as people say it. */
@Pipe({ name: 'tmDay' })
export class DayPipe implements PipeTransform {
  transform(instant: string): string {
    return formatDay(instant, new Date());
  }
}
