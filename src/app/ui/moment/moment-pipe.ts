import { Pipe, PipeTransform } from '@angular/core';

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const two = (value: number): string => String(value).padStart(2, '0');

/** A moment in the reader's own time: `12 Mar 09:41`, with the year when it is not this one. */
export function formatMoment(instant: string, now: Date = new Date()): string {
  const at = new Date(instant);
  const day = `${at.getDate()} ${MONTHS[at.getMonth()]}`;
  const year = at.getFullYear() === now.getFullYear() ? '' : ` ${at.getFullYear()}`;
  return `${day}${year} ${two(at.getHours())}:${two(at.getMinutes())}`;
}

@Pipe({ name: 'tmMoment' })
export class MomentPipe implements PipeTransform {
  transform(instant: string): string {
    return formatMoment(instant);
  }
}
