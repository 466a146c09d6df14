import { useState } from 'react';
import { ActivityIndicator, View } from 'react-native';
import { AppText } from './AppText';
import { Banner } from './Banner';
import { Button } from './Button';
import { Row, Stack } from './Layout';
import { useTheme } from './ThemeProvider';
import { space, stroke } from './tokens';

/** Long work with its count; without a total it only says that it goes on. */
export function Progress({ label, done, total }: { label: string; done?: number; total?: number }) {
  const { colors } = useTheme();
  const hasCount = done !== undefined && total !== undefined && total > 0;
  return (
    <Stack gap="s">
      <Row gap="m">
        {hasCount ? null : <ActivityIndicator color={colors.markingBlue} accessibilityLabel={label} />}
        <AppText isLive>{hasCount ? `${label}: ${done} of ${total}` : label}</AppText>
      </Row>
      {hasCount ? (
        <View
          role="progressbar"
          aria-label={label}
          aria-valuemin={0}
          aria-valuemax={total}
          aria-valuenow={done}
          style={{
            height: 14,
            borderWidth: stroke.line,
            borderColor: colors.line,
            borderRadius: 7,
            overflow: 'hidden',
          }}
        >
          <View
            style={{
              width: `${Math.min(100, (100 * done) / total)}%`,
              flex: 1,
              backgroundColor: colors.water,
            }}
          />
        </View>
      ) : null}
    </Stack>
  );
}

/** Nothing here yet: says so and offers the next thing to do. */
export function EmptyState({
  title,
  sentence,
  actionTitle,
  onAction,
}: {
  title: string;
  sentence: string;
  actionTitle?: string;
  onAction?: () => void;
}) {
  return (
    <Stack gap="m" align="flex-start" style={{ paddingVertical: space.xl, maxWidth: 560 }}>
      <AppText variant="heading" level={2}>
        {title}
      </AppText>
      <AppText color="quietInk">{sentence}</AppText>
      {actionTitle && onAction ? <Button title={actionTitle} kind="primary" onPress={onAction} /> : null}
    </Stack>
  );
}

/** It did not work: what happened, Try again, and the details to hand on. */
export function ErrorState({
  sentence,
  details,
  onTryAgain,
  againTitle = 'Try again',
}: {
  sentence: string;
  /** for whoever mends it: code, request id, version */
  details?: string;
  onTryAgain?: () => void;
  againTitle?: string;
}) {
  const [copied, setCopied] = useState<'no' | 'yes' | 'shown'>('no');
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(details ?? '');
      setCopied('yes');
    } catch {
      // no clipboard without a secure page: show them to be copied by hand
      setCopied('shown');
    }
  };
  return (
    <Banner kind="refusal" sentence={sentence}>
      <Row>
        {onTryAgain ? <Button title={againTitle} kind="primary" onPress={onTryAgain} /> : null}
        {details ? (
          <Button
            title={copied === 'yes' ? 'Details copied' : 'Copy details'}
            icon="copy"
            onPress={() => void copy()}
          />
        ) : null}
      </Row>
      {copied === 'shown' ? (
        <AppText variant="small" color="quietInk" isSelectable>
          {details}
        </AppText>
      ) : null}
    </Banner>
  );
}
