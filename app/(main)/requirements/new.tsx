export { NewRequirementScreen as default } from '@/components/layout/fetched-screens';
