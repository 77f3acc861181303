export { FirstAdminScreen as default } from '@/components/auth/FirstAdminScreen';
