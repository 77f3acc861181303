export { MoreScreen as default } from '@/components/team/MoreScreen';
