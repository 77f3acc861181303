export { RecordingsScreen as default } from '@/components/recordings/RecordingsScreen';
