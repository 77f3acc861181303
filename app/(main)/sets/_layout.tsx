export { SetsLayout as default } from '@/components/sets/SetsLayout';
