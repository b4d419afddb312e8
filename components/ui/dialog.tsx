import { useId, type ReactNode } from 'react';
import { View } from 'react-native';
import { space } from '@/components/theme/space.ts';
import { Button } from './button.tsx';
import { ModalElement } from './modal-element.web.tsx';
import { Row, Stack } from './stack.tsx';
import { Heading } from './text.tsx';

/** A dialog over the page: the browser keeps the focus inside and gives it back. */
export function Dialog({
  title,
  open,
  onClose,
  children,
  actions,
  closable = true,
  closeLabel = 'Not now',
}: {
  readonly title: string;
  readonly open: boolean;
  readonly onClose: () => void;
  readonly children: ReactNode;
  /** Beside the way out, the last one first. */
  readonly actions?: ReactNode;
  /** Escape and a button lead out of it. */
  readonly closable?: boolean;
  readonly closeLabel?: string;
}) {
  const id = useId();
  return (
    <ModalElement open={open} labelledBy={id} onCancel={closable ? onClose : undefined}>
      {open ? (
        <Stack gap="l">
          <Heading level={2} id={id}>
            {title}
          </Heading>
          {children}
          {closable || actions !== undefined ? (
            <View style={{ marginTop: space.s }}>
              <Row justify="flex-end">
                {closable ? <Button label={closeLabel} onPress={onClose} /> : null}
                {actions}
              </Row>
            </View>
          ) : null}
        </Stack>
      ) : null}
    </ModalElement>
  );
}
