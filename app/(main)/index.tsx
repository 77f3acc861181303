export { TodayScreen as default } from '@/components/today/TodayScreen';
