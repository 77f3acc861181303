/** How the mapping screen calls the files. */
import type { FileRole } from '@/shared/contracts/recordings';

export const FILE_TITLES: Record<FileRole, string> = {
  imu: 'IMU file',
  gnss: 'GNSS file',
  reference: 'Reference file',
  imu2: 'Second IMU file',
  aids: 'Other sensors',
};

/** Fixes in the IMU's own file have a card, but no file. */
export const titleOf = (role: FileRole, files: readonly { role: FileRole }[]): string =>
  role === 'gnss' && files.length > 0 && !files.some((file) => file.role === 'gnss')
    ? 'GNSS in the IMU file'
    : FILE_TITLES[role];
