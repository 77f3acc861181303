export { SetsScreen as default } from '@/components/sets/SetsLayout';
