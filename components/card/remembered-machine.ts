const key = 'cinderpath.machine';

/** The machine somebody last stood at with this device; one of another plant matches nothing and is asked for again. */
export function rememberedMachine(): string | null {
  try {
    return window.localStorage.getItem(key);
  } catch {
    return null; // storage may be forbidden
  }
}

export function rememberMachine(id: string): void {
  try {
    window.localStorage.setItem(key, id);
  } catch {
    // It is asked for again then.
  }
}
