import type { ReactNode } from 'react';
import { View } from 'react-native';
import { space } from '@/components/theme/space.ts';
import { FormElement } from './form-element.web.tsx';

/** Fields that are sent together: Enter sends, and password managers know it for a form. */
export function Form({
  children,
  onSubmit,
  label,
}: {
  readonly children: ReactNode;
  readonly onSubmit: () => unknown;
  readonly label?: string;
}) {
  return (
    <FormElement label={label} onSubmit={onSubmit}>
      <View style={{ gap: space.l }}>{children}</View>
    </FormElement>
  );
}
