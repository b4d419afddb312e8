import { useEffect, useId, useRef, useState, type ReactNode } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { Button } from './button.tsx';
import { describedBy, Field } from './field.tsx';
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
  const [over, setOver] = useState(false);
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
      <div
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={(event) => {
          event.preventDefault();
          setOver(false);
          if (disabled !== true) take(event.dataTransfer.files[0]);
        }}
        style={{
          position: 'relative',
          border: `${over ? 2 : 1}px ${file === null ? 'dashed' : 'solid'} ${shownError === undefined ? roles.ink : roles.wrong}`,
          borderRadius: 3,
          background: over ? roles.touched : roles.sheet,
          padding: 12,
          minHeight: 72,
          display: 'flex',
          flexWrap: 'wrap',
          alignItems: 'center',
          gap: 12,
          fontFamily: family.reading,
          fontSize: 17,
          lineHeight: '24px',
          color: roles.ink,
        }}
      >
        {picture && file !== null ? <Preview file={file} /> : <Mark name={picture ? 'picture' : 'file'} size={28} />}
        <span style={{ flex: '1 1 160px', minWidth: 0, overflowWrap: 'anywhere' }}>
          {file === null ? (
            <>
              <span style={{ fontFamily: family.readingMedium }}>{words.choose}</span> {words.or}
            </>
          ) : (
            <>
              <span style={{ fontFamily: family.readingMedium }}>{file.name}</span>
              <span style={{ display: 'block', fontSize: 15, color: roles.softInk }}>
                {fileSize(file.size)}. {words.other}
              </span>
            </>
          )}
        </span>
        <input
          id={id}
          type="file"
          accept={accept}
          disabled={disabled}
          aria-invalid={shownError !== undefined}
          aria-describedby={describedBy(id, hint, shownError)}
          onChange={(event) => {
            take(event.target.files?.[0]);
            event.target.value = ''; // so that the same file can be chosen again after it was mended
          }}
          style={{ position: 'absolute', inset: 0, width: '100%', height: '100%', opacity: 0, cursor: 'pointer' }}
        />
        {file === null ? null : (
          <span style={{ position: 'relative' }}>
            <Button kind="quiet" label="Remove" spoken={`Remove ${file.name}`} onPress={() => onChange(null)} />
          </span>
        )}
      </div>
    </Field>
  );
}

function Preview({ file }: { readonly file: File }) {
  const image = useRef<HTMLImageElement>(null);
  const [unreadable, setUnreadable] = useState<File | null>(null);
  useEffect(() => {
    const made = URL.createObjectURL(file);
    if (image.current !== null) image.current.src = made;
    return () => URL.revokeObjectURL(made);
  }, [file]);
  // A picture that this browser can't show may still be one that the server can read.
  if (unreadable === file) return <Mark name="picture" size={28} />;
  return (
    <img
      ref={image}
      alt=""
      onError={() => setUnreadable(file)}
      style={{ width: 96, height: 72, objectFit: 'cover', borderRadius: 2 }}
    />
  );
}
