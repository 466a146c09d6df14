import { JetBrainsMono_400Regular } from '@expo-google-fonts/jetbrains-mono/400Regular';
import { JetBrainsMono_600SemiBold } from '@expo-google-fonts/jetbrains-mono/600SemiBold';
import { JetBrainsMono_800ExtraBold } from '@expo-google-fonts/jetbrains-mono/800ExtraBold';
import { useFonts } from 'expo-font';
import type { ReactNode } from 'react';

/** Holds the first paint until the three weights are there; goes on with the device's own fonts when they fail. */
export function FontGate({ children }: { children: ReactNode }) {
  const [areLoaded, problem] = useFonts({
    JetBrainsMono_400Regular,
    JetBrainsMono_600SemiBold,
    JetBrainsMono_800ExtraBold,
  });
  return areLoaded || problem ? children : null;
}
