import { Role } from '../../../../shared/contracts/common';

/** A place of the application as the bars show it. */
export interface Place {
  readonly path: string;
  readonly name: string;
  readonly roles: readonly Role[];
  /** Key after `g` that goes there. */
  readonly key: string;
  /** Whether only the exact address counts as being there. */
  readonly exact: boolean;
}

const ALL: readonly Role[] = ['analyst', 'lead', 'auditor', 'administrator'];

/** Places in the order of the top bar. A place a role can't use is absent from its bar. */
export const PLACES: readonly Place[] = [
  { path: '/', name: 'Waiting', roles: ALL, key: 'w', exact: true },
  { path: '/intake', name: 'Intake', roles: ['analyst'], key: 'i', exact: false },
  { path: '/studies', name: 'Studies', roles: ALL, key: 's', exact: false },
  { path: '/bench', name: 'Bench', roles: ALL, key: 'b', exact: false },
  { path: '/audit', name: 'Audit', roles: ['lead', 'auditor', 'administrator'], key: 'a', exact: false },
  { path: '/thresholds', name: 'Thresholds', roles: ['analyst', 'lead', 'auditor'], key: 't', exact: false },
  { path: '/people', name: 'People', roles: ['administrator'], key: 'p', exact: false },
  { path: '/outbox', name: 'Outbox', roles: ['administrator'], key: 'o', exact: false },
];

export const placesFor = (roles: readonly Role[]): readonly Place[] =>
  PLACES.filter((place) => place.roles.some((role) => roles.includes(role)));
