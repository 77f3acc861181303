export { RequirementsScreen as default } from '@/components/requirements/RequirementsScreen';
