import { useRouter } from 'expo-router';
import { FrontDoor } from '@/components/bench/FrontDoor';

export default function FrontDoorRoute() {
  const router = useRouter();
  return <FrontDoor onBench={() => router.push('/bench')} onDesk={() => router.push('/desk')} />;
}
