export { ForgotPasswordScreen as default } from '@/components/auth/ForgotPasswordScreen';
