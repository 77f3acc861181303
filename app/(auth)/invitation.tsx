export { InvitationScreen as default } from '@/components/auth/InvitationScreen';
