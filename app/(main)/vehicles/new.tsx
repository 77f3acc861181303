export { NewVehicleScreen as default } from '@/components/vehicles/VehicleScreen';
