import { useId, type ReactNode } from 'react';
import { StyleSheet, Text, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import { Button } from './button.tsx';
import { describedBy, Field } from './field.tsx';
import { FileDrop, Preview } from './file-drop.web.tsx';
import { Mark } from './mark.tsx';

export type FilePickerProps = {
  readonly label: string;
  /** Held by the screen, so that it stays chosen when sending fails. */
  readonly file: File | null;
  readonly onChange: (file: File | null) => void;
  /** As an input's `accept`, e.g. '.dxf,.svg'. */
  readonly accept?: string;
  /** A larger one stays chosen, and the picker says that it can't be taken; the screen sends none that is not `fits`. */
  readonly maxBytes?: number;
  /** What to do about a file that is too large. */
  readonly tooLarge?: string;
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly optional?: boolean;
  readonly disabled?: boolean;
};

const kibi = 1024;

/** Size of a file as people read it: "418 KiB". Limits are whole in these units, so a file just above one never reads the same. */
export const fileSize = (bytes: number): string => {
  if (bytes < kibi) return `${bytes} B`;
  if (bytes < kibi * kibi) return `${Math.ceil(bytes / kibi)} KiB`;
  return `${(Math.ceil((bytes / kibi / kibi) * 10) / 10).toFixed(1).replace(/\.0$/, '')} MiB`;
};

/** Whether a chosen file is small enough to be sent. */
export const fits = (file: File, maxBytes: number): boolean => file.size <= maxBytes;

/** Chooses a file, by picking or by dropping it; says its name and size. */
export function FilePicker(props: FilePickerProps) {
  return <Picker {...props} words={{ choose: 'Choose a file', other: 'Choose another', or: 'or drop it here' }} />;
}

/** Takes or chooses a picture and shows it. The phone offers its camera by itself. */
export function PhotoPicker(props: Omit<FilePickerProps, 'accept'>) {
  return (
    <Picker
      {...props}
      accept="image/*"
      words={{ choose: 'Take or choose a picture', other: 'Another picture', or: '' }}
      picture
    />
  );
}

function Picker({
  label,
  file,
  onChange,
  accept,
  maxBytes,
  hint,
  error,
  tooLarge = '',
  optional,
  disabled,
  words,
  picture = false,
}: FilePickerProps & {
  readonly words: { readonly choose: string; readonly other: string; readonly or: string };
  readonly picture?: boolean;
}) {
  const id = useId();
  const shownError =
    file !== null && maxBytes !== undefined && !fits(file, maxBytes)
      ? `“${file.name}” has ${fileSize(file.size)}; at most ${fileSize(maxBytes)} are taken. ${tooLarge}`.trim()
      : error;

  const take = (chosen: File | null | undefined) => {
    if (chosen === null || chosen === undefined) return; // the file dialog was closed: what was chosen stays
    onChange(chosen);
  };

  return (
    <Field id={id} label={label} hint={hint} error={shownError} optional={optional}>
      <FileDrop
        id={id}
        accept={accept}
        disabled={disabled}
        invalid={shownError !== undefined}
        describedBy={describedBy(id, hint, shownError)}
        filled={file !== null}
        over={
          file === null ? null : (
            <Button kind="quiet" label="Remove" spoken={`Remove ${file.name}`} onPress={() => onChange(null)} />
          )
        }
        onFile={take}
      >
        {picture && file !== null ? <Preview file={file} /> : <Mark name={picture ? 'picture' : 'file'} size={28} />}
        <View style={styles.words}>
          {file === null ? (
            <Text style={styles.main}>
              <Text style={styles.strong}>{words.choose}</Text> {words.or}
            </Text>
          ) : (
            <>
              <Text style={[styles.main, styles.strong]}>{file.name}</Text>
              <Text style={styles.size}>
                {fileSize(file.size)}. {words.other}
              </Text>
            </>
          )}
        </View>
      </FileDrop>
    </Field>
  );
}

const styles = StyleSheet.create({
  words: { flexGrow: 1, flexShrink: 1, flexBasis: 160, minWidth: 0 },
  main: {
    fontFamily: family.reading,
    fontSize: 17,
    lineHeight: 24,
    color: roles.ink,
    ...webStyle({ overflowWrap: 'anywhere' }),
  },
  strong: { fontFamily: family.readingMedium },
  size: { fontFamily: family.reading, fontSize: 15, lineHeight: 24, color: roles.softInk },
});
