import { useEffect, useState } from 'react';

/** The value, once it has stood still for `ms`; equal is what reads alike as JSON. */
export function useSettled<T>(value: T, ms: number): T {
  const key = JSON.stringify(value);
  const [settled, setSettled] = useState({ key, value });
  useEffect(() => {
    if (settled.key === key) return;
    const timer = setTimeout(() => setSettled({ key, value }), ms);
    return () => clearTimeout(timer);
  }, [key, value, ms, settled.key]);
  return settled.value;
}
