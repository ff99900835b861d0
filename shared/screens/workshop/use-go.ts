import { useRouter, type Href } from 'expo-router';

/** Goes on to an address of the app. */
export function useGo(): (href: string) => void {
  const router = useRouter();
  return (href) => router.push(href as Href);
}
