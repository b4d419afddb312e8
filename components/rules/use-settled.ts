import { useEffect, useState } from 'react';

/** A value once it has stayed for so many ms: the server is asked when one stops typing or dragging, not at each step. */
export function useSettled<T>(value: T, ms: number): T {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), ms);
    return () => clearTimeout(timer);
  }, [value, ms]);
  return settled;
}
