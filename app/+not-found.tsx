import { NotFound } from '@/components/layout/NotFound';

export default NotFound;
