import type { ReactNode } from 'react';
import { Text } from 'react-native';

/** Words for the ear only: they complete what the eye sees, so that a name said aloud contains the name on screen. */
export function Spoken({ isLive = false, children }: { isLive?: boolean; children: ReactNode }) {
  return (
    <Text
      role={isLive ? 'status' : undefined}
      aria-live={isLive ? 'polite' : undefined}
      style={{
        position: 'absolute',
        width: 1,
        height: 1,
        overflow: 'hidden',
        clip: 'rect(0 0 0 0)',
        opacity: 0.01,
      }}
    >
      {' '}
      {children}{' '}
    </Text>
  );
}
