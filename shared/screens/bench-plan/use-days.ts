import { useLocalSearchParams, useRouter } from 'expo-router';
import { useNow } from '@/shared/client/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { dayOf } from '@/shared/ui/format/zone';

/** Which days the address asks for; today where it names none. */
export function useDays() {
  const router = useRouter();
  const params = useLocalSearchParams<{ day?: string; days?: string }>();
  const { zone } = useFormats();
  const now = useNow(60_000);
  const today = dayOf(now, zone);
  const named = params.day && /^\d{4}-\d\d-\d\d$/.test(params.day) ? params.day : null;
  const days: 1 | 7 = params.days === '7' ? 7 : 1;
  return {
    now,
    today,
    day: named ?? today,
    /** As it is asked for: null is today, also past midnight. */
    asked: named === today ? null : named,
    days,
    show: (day: string, next: 1 | 7) =>
      router.setParams({ day: day === today ? '' : day, days: next === 7 ? '7' : '' }),
  };
}
