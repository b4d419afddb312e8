/** The answer of a closed form, or null where it refuses the question with a RangeError: a spike without an angle, a feed of zero, a cut that leaves no heat. */
export function answered<T>(ask: () => T): T | null {
  try {
    return ask();
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}
