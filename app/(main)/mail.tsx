import { Screen } from '@/components/layout/Screen';

export default function Today() {
  return <Screen title="Today">{null}</Screen>;
}
