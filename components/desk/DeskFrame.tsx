import { useState, type ReactNode } from 'react';
import { View, useWindowDimensions } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { PressArea } from '@/components/ui/PressArea';
import { Sheet } from '@/components/ui/Sheet';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, space, stroke, targetSize } from '@/components/ui/tokens';
import { webProps } from '@/components/ui/webProps';

export type DeskPlace = { href: string; title: string; isCurrent: boolean };

/** Width from which list and detail stand side by side and the places have a rail. */
export const wideFromPx = 840;
/** Whether the window is wide enough for two panes. */
export const useIsWide = () => useWindowDimensions().width >= wideFromPx;

type Props = {
  places: DeskPlace[];
  shopName: string;
  personName: string;
  /** a word about the state of the line, when it is not as usual */
  notice?: string;
  onGo: (href: string) => void;
  onAccount: () => void;
  children: ReactNode;
};

/** What stands around every desk screen: a rail beside it, or one bar with a menu on a phone. */
export function DeskFrame(props: Props) {
  const { colors } = useTheme();
  const isWide = useIsWide();
  return (
    <View style={{ flex: 1, flexDirection: isWide ? 'row' : 'column', backgroundColor: colors.ground }}>
      {isWide ? <Rail {...props} /> : <Bar {...props} />}
      <View style={{ flex: 1, minWidth: 0 }}>
        {props.notice ? (
          <View
            role="status"
            style={{
              paddingHorizontal: space.l,
              paddingVertical: space.s,
              borderBottomWidth: stroke.line,
              borderColor: colors.line,
              backgroundColor: colors.surface,
            }}
          >
            <AppText variant="small">{props.notice}</AppText>
          </View>
        ) : null}
        {props.children}
      </View>
    </View>
  );
}

function Rail({ places, shopName, personName, onGo, onAccount }: Props) {
  const { colors } = useTheme();
  return (
    <View
      role="navigation"
      aria-label="Desk"
      {...webProps({ dataSet: { print: 'no' } })}
      style={{
        width: 152,
        padding: space.s,
        gap: space.xs,
        borderRightWidth: stroke.line,
        borderColor: colors.line,
        backgroundColor: colors.surface,
      }}
    >
      <View style={{ padding: space.s, paddingBottom: space.l }}>
        <AppText variant="label" weight="800" color="water">
          Inchwater
        </AppText>
        <AppText variant="small" color="quietInk">
          {shopName}
        </AppText>
      </View>
      {places.map((place) => (
        <PlaceLink key={place.href} place={place} onGo={onGo} />
      ))}
      <View style={{ flex: 1 }} />
      <Button title={personName} label={`Account of ${personName}`} isWide onPress={onAccount} />
    </View>
  );
}

function Bar({ places, shopName, personName, onGo, onAccount }: Props) {
  const { colors } = useTheme();
  const [isOpen, setIsOpen] = useState(false);
  const current = places.find((place) => place.isCurrent);
  return (
    <View
      role="navigation"
      aria-label="Desk"
      {...webProps({ dataSet: { print: 'no' } })}
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        gap: space.s,
        paddingHorizontal: space.l,
        paddingVertical: space.s,
        borderBottomWidth: stroke.line,
        borderColor: colors.line,
        backgroundColor: colors.surface,
      }}
    >
      <View style={{ flex: 1, minWidth: 0 }}>
        <AppText variant="label" weight="800" color="water">
          Inchwater
        </AppText>
        <AppText variant="small" color="quietInk" lines={1}>
          {shopName}
        </AppText>
      </View>
      <Button
        title={current?.title ?? 'Menu'}
        label={current ? `${current.title}, menu` : 'Menu'}
        icon="more"
        isExpanded={isOpen}
        onPress={() => setIsOpen(true)}
      />
      {isOpen ? (
        <Sheet title={shopName} onClose={() => setIsOpen(false)}>
          {places.map((place) => (
            <PlaceLink
              key={place.href}
              place={place}
              onGo={(href) => {
                setIsOpen(false);
                onGo(href);
              }}
            />
          ))}
          <Button
            title={personName}
            label={`Account of ${personName}`}
            isWide
            onPress={() => {
              setIsOpen(false);
              onAccount();
            }}
          />
        </Sheet>
      ) : null}
    </View>
  );
}

function PlaceLink({ place, onGo }: { place: DeskPlace; onGo: (href: string) => void }) {
  const { colors } = useTheme();
  return (
    <PressArea
      href={place.href}
      onPress={() => onGo(place.href)}
      web={place.isCurrent ? { 'aria-current': 'page' } : {}}
    >
      {(isPressed) => (
        <View
          style={{
            minHeight: targetSize.desk,
            justifyContent: 'center',
            paddingHorizontal: space.m,
            borderRadius: radius.key,
            borderLeftWidth: 4,
            borderLeftColor: place.isCurrent ? colors.markingBlue : 'transparent',
            backgroundColor: isPressed || place.isCurrent ? colors.pressed : 'transparent',
          }}
        >
          <AppText variant="label" weight={place.isCurrent ? '800' : '600'}>
            {place.title}
          </AppText>
        </View>
      )}
    </PressArea>
  );
}
