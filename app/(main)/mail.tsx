export { MailScreen as default } from '@/components/team/MailScreen';
