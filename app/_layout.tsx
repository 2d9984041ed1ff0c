import '@/assets/global.css';
import { QueryClientProvider } from '@tanstack/react-query';
import { Slot } from 'expo-router';
import { SessionGate } from '@/components/shell/session-gate';
import { SessionPrompts } from '@/components/shell/session-prompts';
import { uiText } from '@/constants/texts/ui';
import { queryClient } from '@/hooks/api';
import { startTheme } from '@/hooks/use-theme';

// Before anything is drawn, so that no one sees the other scheme flash by.
startTheme();

export default function RootLayout() {
  return (
    <QueryClientProvider client={queryClient}>
      <a className="skip-link" href="#content">
        {uiText.skipToContent}
      </a>
      <SessionGate>
        <Slot />
        <SessionPrompts />
      </SessionGate>
    </QueryClientProvider>
  );
}
