export { UploadScreen as default } from '@/components/recordings/UploadScreen';
