/** The screens of single things, as one module that is imported dynamically from one place (layout/fetched-screens.tsx). */
export { RecordingScreen } from './recordings/RecordingScreen';
export { EditRequirementScreen, NewRequirementScreen } from './requirements/EditRequirementScreen';
export { SetScreen } from './sets/SetScreen';
export { AuditScreen } from './team/AuditScreen';
export { NewVehicleScreen, VehicleScreen } from './vehicles/VehicleScreen';
export { MatrixScreen } from './verification/MatrixScreen';
