import { CanDeactivateFn } from '@angular/router';

/** A page that may hold logs nobody has sent yet. */
export interface HoldsLogs {
  /** Whether leaving now would lose something. */
  wouldLose(): boolean;
}

/** Asks before logs that were read but not sent are left behind. */
export const leaveWithUnsentLogs: CanDeactivateFn<HoldsLogs> = (page) =>
  !page.wouldLose() || window.confirm('Some logs are not sent yet. Leave, and drop them again another time?');
