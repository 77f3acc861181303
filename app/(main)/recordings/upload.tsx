export { UploadScreen as default } from '@/components/layout/fetched-screens';
