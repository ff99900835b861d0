// The real router is CommonJS over raw packages, which vitest cannot load; unit tests of parts need only its surface.
import type { ReactNode } from 'react';
import { Text } from 'react-native';
import { vi } from 'vitest';

export const router = {
  push: vi.fn(),
  replace: vi.fn(),
  back: vi.fn(),
  canGoBack: () => true,
  setParams: vi.fn(),
  navigate: vi.fn(),
  dismissTo: vi.fn(),
};
export const useRouter = () => router;
export const useLocalSearchParams = () => ({});
export const usePathname = () => '/';
export const useSegments = (): string[] => [];
export const Redirect = ({ href }: { href: string }) => <Text>{`redirect ${href}`}</Text>;
export const Link = ({ href, children }: { href: string; children?: ReactNode }) => (
  <Text role="link" {...({ href } as object)}>
    {children}
  </Text>
);
const Pass = ({ children }: { children?: ReactNode }) => <>{children}</>;
export const Slot = Pass;
export const Stack = Object.assign(Pass, { Screen: () => null, Protected: Pass });
