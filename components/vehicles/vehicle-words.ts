import type { Vehicle } from '@/shared/contracts/vehicles';

export const KINDS: Record<Vehicle['kind'], string> = {
  road: 'road vehicle',
  marine: 'vessel or crawler',
  fixedWing: 'fixed-wing aircraft',
  multirotor: 'multirotor',
  other: 'other platform',
};
