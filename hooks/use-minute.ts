import { useEffect, useState } from 'react';

const minuteMs = 60_000;

const startOfMinute = () => Math.floor(Date.now() / minuteMs) * minuteMs;

/** The running minute: prices move with time, but not with every key stroke. */
export function useMinute(): number {
  const [minute, setMinute] = useState(startOfMinute);
  useEffect(() => {
    const untilNext = minute + minuteMs - Date.now();
    const timer = setTimeout(() => setMinute(startOfMinute()), Math.max(untilNext, 250));
    return () => clearTimeout(timer);
  }, [minute]);
  return minute;
}
