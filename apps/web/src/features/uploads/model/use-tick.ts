import { useEffect, useState } from 'react';

/** A number that grows once a second while something is going on. */
export function useTick(isRunning: boolean): number {
  const [tick, setTick] = useState(0);
  useEffect(() => {
    if (!isRunning) return;
    const timer = setInterval(() => setTick((now) => now + 1), 1000);
    return () => clearInterval(timer);
  }, [isRunning]);
  return tick;
}
