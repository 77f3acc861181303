/** Screens whose code comes when they are first opened: sign-in and the lists do without it. */
import { createElement, lazy, type ComponentType } from 'react';
import { ScreenPending } from './ScreenPending';

const lab = () => import('@/components/lab');
const details = () => import('@/components/details');

export const BenchScreen = fetched('Bench', async () => (await lab()).BenchScreen);
export const CompareScreen = fetched('Compare', async () => (await lab()).CompareScreen);
export const ReportScreen = fetched('Report', async () => (await lab()).ReportScreen);
export const NoiseScreen = fetched('Sensor noise', async () => (await lab()).NoiseScreen);

export const AuditScreen = fetched('Audit trail', async () => (await details()).AuditScreen);
export const UploadScreen = fetched('Upload a recording', async () => (await details()).UploadScreen);
export const MappingScreen = fetched('Mapping', async () => (await details()).MappingScreen);
export const RecordingScreen = fetched('Recording', async () => (await details()).RecordingScreen);
export const SetScreen = fetched('Parameter set', async () => (await details()).SetScreen);
export const MatrixScreen = fetched('Verification', async () => (await details()).MatrixScreen);
export const VehicleScreen = fetched('Vehicle', async () => (await details()).VehicleScreen);
export const NewVehicleScreen = fetched('New vehicle', async () => (await details()).NewVehicleScreen);
export const EditRequirementScreen = fetched(
  'Requirement',
  async () => (await details()).EditRequirementScreen,
);
export const NewRequirementScreen = fetched(
  'New requirement',
  async () => (await details()).NewRequirementScreen,
);

/** The screen that `load` brings; until then its title stands over a skeleton. */
function fetched<P extends object>(title: string, load: () => Promise<ComponentType<P>>): ComponentType<P> {
  const Loaded = lazy(async () => ({ default: await load() }));
  return function FetchedScreen(props: P) {
    return <ScreenPending title={title}>{createElement(Loaded as ComponentType<P>, props)}</ScreenPending>;
  };
}
