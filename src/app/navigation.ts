import {type Permission} from '#shared/permissions';
import {type IconName} from './ui/icons';

/** One place in the navigation, shown to who holds the permission. */
export interface NavigationEntry {
  readonly path: string;
  readonly label: string;
  readonly icon: IconName;
  readonly permission: Permission;
}

/** One line per feature, in the order of the screen. */
export const NAVIGATION: readonly NavigationEntry[] = [
  {path: '/today', label: 'Today', icon: 'today', permission: 'bench:use'},
  {path: '/bench', label: 'Bench', icon: 'experiment', permission: 'bench:use'},
  {path: '/exercises', label: 'Exercises', icon: 'school', permission: 'exercises:read'},
  {path: '/attempts', label: 'Attempts', icon: 'fact_check', permission: 'attempts:read-others'},
];
