import { AuditScreen } from '@/components/layout/fetched-screens';

export default function Audit() {
  return <AuditScreen />;
}
