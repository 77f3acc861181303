export { TeamScreen as default } from '@/components/team/TeamScreen';
