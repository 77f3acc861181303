export { NewRequirementScreen as default } from '@/components/requirements/EditRequirementScreen';
