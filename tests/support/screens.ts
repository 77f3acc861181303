/** Every screen there is, with the role that sees most of it and the sign that it is complete. */
import type { Page } from 'playwright-core';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import type { Role } from '@/shared/contracts/roles';
import { Person } from './person';

export interface Screen {
  name: string;
  path: string;
  /** null: signed out. */
  role: Role | null;
  /** Waited for before the page counts as shown. */
  ready: (page: Page) => Promise<void>;
}

const heading = (name: string | RegExp) => (page: Page) =>
  page.getByRole('heading', { name }).filter({ visible: true }).first().waitFor();
const words = (text: string) => (page: Page) =>
  page.getByText(text).filter({ visible: true }).first().waitFor();
const runDone = (page: Page) => page.getByRole('status').filter({ hasText: 'Run done' }).waitFor();

/** The screens of a stack with the demonstration, its first recording decoded and tried on the bench. */
export async function screensOf(server: string): Promise<Screen[]> {
  const engineer = DEMO_PEOPLE.find(({ role }) => role === 'engineer')!;
  const person = await Person.signIn(server, engineer.email, DEMO_PASSWORD);
  const recordings = await person.list<{ id: string; name: string }>('/recordings');
  const [recording] = recordings;
  const [set] = await person.list<{ id: string; name: string }>('/parameter-sets');
  const [vehicle] = await person.list<{ id: string; name: string }>('/vehicles');
  if (!recording || !set || !vehicle) throw new Error('The demonstration has no recording, set or vehicle.');
  for (const { id } of recordings) await person.decoded(id);
  const windows = '120~180';
  const signedIn = (name: string, path: string, ready: Screen['ready'], role: Role = 'engineer') => ({
    name, path, ready, role,
  }); // prettier-ignore
  return [
    { name: 'sign-in', path: '/sign-in', role: null, ready: heading('Sign in') },
    { name: 'forgot-password', path: '/forgot-password', role: null, ready: heading('Reset the password') },
    signedIn('today', '/', heading('Today')),
    signedIn('recordings', '/recordings', words(recording.name)),
    signedIn('recording', `/recordings/${recording.id}`, heading(recording.name)),
    signedIn('mapping', `/recordings/${recording.id}/mapping`, heading('IMU file')),
    signedIn('noise', `/recordings/${recording.id}/noise`, heading('Gyro: Allan deviation')),
    signedIn('upload', '/recordings/upload', heading('Upload a recording')),
    signedIn('bench', `/bench/${recording.id}?w=${windows}`, runDone),
    signedIn(
      'compare',
      `/bench/compare?on=${recording.id}&of=start,set~${set.id}~1&w=${windows}`,
      heading('Parameters that differ'),
    ),
    signedIn('sets', '/sets', words(set.name)),
    signedIn('set', `/sets/${set.id}`, heading('Version 1')),
    signedIn('verification', `/sets/${set.id}/verification?version=1`, heading(/: verification$/)),
    signedIn('report', `/sets/${set.id}/report?version=1`, heading('Parameters')),
    signedIn('requirements', '/requirements', heading('Requirements')),
    signedIn('new-requirement', '/requirements/new', heading('Judged on')),
    signedIn('vehicles', '/vehicles', words(vehicle.name)),
    signedIn('vehicle', `/vehicles/${vehicle.id}`, heading(vehicle.name)),
    signedIn('team', '/team', heading('Members'), 'admin'),
    signedIn('audit', '/audit', heading('Audit trail'), 'admin'),
    signedIn('mail', '/mail', heading('Mail'), 'admin'),
    signedIn('profile', '/profile', heading('Profile')),
    signedIn('more', '/more', heading('More')),
  ];
}
