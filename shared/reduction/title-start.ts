import { dayNumber } from './calendar';
import { parseStamp } from './clock';

/** A date followed by a clock, as a title line such as `# started 2026-05-18T09:30:00` holds it. */
const MOMENT =
  /(\d{4}[-/.]\d{1,2}[-/.]\d{1,2}|\d{1,2}[-/.]\d{1,2}[-/.]\d{2,4})(?:\s*[T,;]\s*|\s+)(?:at\s+)?(\d{1,2}:\d{2}(?::\d{2}(?:\.\d+)?)?(?:\s*[AP]M)?)/i;
/** Words that say the moment is the log's start, and none that it is another. */
const START = /\b(start\w*|began|begin\w*|record\w*|logg\w*|date|datum|created|time|zeit|debut)\b/i;
const NOT_START = /\b(end\w*|stop\w*|finish\w*|export\w*|calibrat\w*|print\w*|ende)\b/i;

/**
 * When a log of mere seconds was started, by the title lines above its header: seconds since 1970-01-01 by the logger's
 * clock, or null when no title says so plainly. A date that reads two ways says nothing.
 */
export function startInTitles(titles: readonly string[]): number | null {
  for (const title of titles) {
    const moment = MOMENT.exec(title);
    if (!moment || !START.test(title) || NOT_START.test(title)) continue;
    const stamp = parseStamp(`${moment[1]} ${moment[2]}`);
    if (!stamp || stamp.date.order === 'unclear') continue;
    return dayNumber(stamp.date, 'day first') * 86400 + stamp.clock.seconds;
  }
  return null;
}
