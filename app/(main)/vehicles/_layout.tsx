export { VehiclesLayout as default } from '@/components/vehicles/VehiclesLayout';
