import type { ReactNode } from 'react';

/** The page's own form: what makes Enter send and password managers offer to keep. React Native has none. */
export function FormElement({
  label,
  onSubmit,
  children,
}: {
  readonly label?: string;
  readonly onSubmit: () => unknown;
  readonly children: ReactNode;
}) {
  return (
    <form
      noValidate
      aria-label={label}
      onSubmit={(event) => {
        event.preventDefault();
        event.stopPropagation(); // a form in a dialog stands inside the page's form in React's tree
        onSubmit();
      }}
      style={{ margin: 0 }}
    >
      {children}
    </form>
  );
}
