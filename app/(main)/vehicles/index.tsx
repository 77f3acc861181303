export { VehiclesScreen as default } from '@/components/vehicles/VehiclesLayout';
