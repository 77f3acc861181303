export { ResetPasswordScreen as default } from '@/components/auth/ResetPasswordScreen';
