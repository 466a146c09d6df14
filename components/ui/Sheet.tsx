import { useId, type ReactNode } from 'react';
import { Modal, ScrollView, View } from 'react-native';
import { AppText } from './AppText';
import { Button } from './Button';
import { Row } from './Layout';
import { useTheme } from './ThemeProvider';
import { radius, space, stroke } from './tokens';
import { webProps } from './webProps';

export type SheetProps = {
  title: string;
  onClose: () => void;
  /** whole screen, or a card at the bottom (phone) or in the middle */
  isFullScreen?: boolean;
  closeTitle?: string;
  children: ReactNode;
};

/** Something in front of the screen: keeps the focus inside, Esc closes it, the focus goes back where it was. */
export function Sheet({ title, onClose, isFullScreen = false, closeTitle = 'Close', children }: SheetProps) {
  const { colors } = useTheme();
  const id = useId();
  return (
    <Modal transparent animationType="none" visible onRequestClose={onClose} aria-labelledby={id}>
      <View
        style={{
          flex: 1,
          backgroundColor: isFullScreen ? colors.ground : 'rgba(8, 12, 16, 0.6)',
          justifyContent: 'center',
          alignItems: 'center',
          padding: isFullScreen ? 0 : space.l,
        }}
      >
        <View
          style={{
            width: '100%',
            maxWidth: isFullScreen ? 720 : 560,
            maxHeight: '100%',
            flexGrow: isFullScreen ? 1 : 0,
            flexShrink: 1,
            padding: space.l,
            gap: space.l,
            backgroundColor: isFullScreen ? colors.ground : colors.surface,
            borderRadius: isFullScreen ? 0 : radius.card,
            borderWidth: isFullScreen ? 0 : stroke.line,
            borderColor: colors.line,
          }}
        >
          <Row justify="space-between" isWrapping={false}>
            <AppText variant="title" level={2} id={id} style={{ flexShrink: 1 }}>
              {title}
            </AppText>
            <Button title={closeTitle} icon="close" onPress={onClose} />
          </Row>
          <ScrollView
            {...webProps({ tabIndex: 0 })}
            style={{ flexShrink: 1 }}
            contentContainerStyle={{ gap: space.m, padding: 3 }}
          >
            {children}
          </ScrollView>
        </View>
      </View>
    </Modal>
  );
}

/** Asks once, and the button repeats its object: "Hand in session 3-012". */
export function ConfirmSheet({
  title,
  sentence,
  actionTitle,
  isDanger = false,
  isBusy = false,
  onConfirm,
  onClose,
}: {
  title: string;
  /** what happens and to what */
  sentence: string;
  actionTitle: string;
  isDanger?: boolean;
  isBusy?: boolean;
  onConfirm: () => void;
  onClose: () => void;
}) {
  return (
    <Sheet title={title} onClose={onClose} closeTitle="Not now">
      <AppText>{sentence}</AppText>
      <Button
        title={actionTitle}
        kind={isDanger ? 'danger' : 'primary'}
        isBusy={isBusy}
        onPress={onConfirm}
        isWide
      />
    </Sheet>
  );
}
