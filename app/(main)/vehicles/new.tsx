export { NewVehicleScreen as default } from '@/components/layout/fetched-screens';
