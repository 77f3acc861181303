/** The screens of single things, as one module that is imported dynamically from one place (layout/fetched-screens.tsx). */
export { MappingScreen } from './recordings/mapping/MappingScreen';
export { RecordingScreen } from './recordings/RecordingScreen';
export { UploadScreen } from './recordings/UploadScreen';
export { EditRequirementScreen, NewRequirementScreen } from './requirements/EditRequirementScreen';
export { SetScreen } from './sets/SetScreen';
export { AuditScreen } from './team/AuditScreen';
export { NewVehicleScreen, VehicleScreen } from './vehicles/VehicleScreen';
export { MatrixScreen } from './verification/MatrixScreen';
