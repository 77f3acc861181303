import type { Href } from 'expo-router';
import type { IconName } from '@/components/ui/Icon';
import type { Permission } from '@/shared/contracts/roles';

export interface Place {
  name: string;
  label: string;
  href: Href & string;
  icon: IconName;
  /** Left out of the way for those who may not. */
  needs?: Permission;
}

/** The bottom bar, and the upper part of the rail. */
export const MAIN_PLACES: readonly Place[] = [
  { name: 'today', label: 'Today', href: '/', icon: 'today' },
  { name: 'recordings', label: 'Recordings', href: '/recordings', icon: 'recordings' },
  { name: 'bench', label: 'Bench', href: '/bench', icon: 'bench' },
  { name: 'sets', label: 'Sets', href: '/sets', icon: 'sets' },
];

/** Under More on the phone, in the lower part of the rail when wide. */
export const MORE_PLACES: readonly Place[] = [
  { name: 'vehicles', label: 'Vehicles', href: '/vehicles', icon: 'vehicle' },
  { name: 'requirements', label: 'Requirements', href: '/requirements', icon: 'check' },
  { name: 'team', label: 'Team', href: '/team', icon: 'team', needs: 'team:manage' },
  { name: 'mail', label: 'Mail', href: '/mail', icon: 'mail', needs: 'mail:read' },
  { name: 'audit', label: 'Audit', href: '/audit', icon: 'file', needs: 'audit:read' },
  { name: 'profile', label: 'Profile', href: '/profile', icon: 'person' },
];

export const MORE: Place = { name: 'more', label: 'More', href: '/more', icon: 'more' };

/** Whether `path` lies at or below a place. */
export const isAt = (path: string, href: string): boolean =>
  href === '/' ? path === '/' : path === href || path.startsWith(`${href}/`);
