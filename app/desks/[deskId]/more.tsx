import { MoreScreen } from '@/components/shell/more-screen';

export default function MoreRoute() {
  return <MoreScreen />;
}
