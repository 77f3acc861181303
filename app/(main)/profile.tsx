export { ProfileScreen as default } from '@/components/team/ProfileScreen';
