import { useRouter } from 'expo-router';
import { Button } from '@/components/ui/Button';
import { Row } from '@/components/ui/Layout';
import { Screen } from '@/components/ui/Screen';
import { AppText } from '@/components/ui/AppText';

export default function NotFoundRoute() {
  const router = useRouter();
  return (
    <Screen title="There is nothing at this address" width="reading">
      <AppText>It may have been typed wrongly, or what stood here has moved. Nothing is lost.</AppText>
      <Row gap="m">
        <Button title="To the bench" kind="primary" href="/bench" onPress={() => router.replace('/bench')} />
        <Button title="To the desk" href="/desk" onPress={() => router.replace('/desk')} />
      </Row>
    </Screen>
  );
}
