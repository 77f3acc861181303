export { RecordingsLayout as default } from '@/components/recordings/RecordingsLayout';
