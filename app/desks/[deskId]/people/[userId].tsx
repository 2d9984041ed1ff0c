import { useLocalSearchParams } from 'expo-router';
import { MemberScreen } from '@/components/people/member-screen';

export default function MemberRoute() {
  const { userId } = useLocalSearchParams<{ userId: string }>();
  return <MemberScreen key={userId} userId={userId} />;
}
