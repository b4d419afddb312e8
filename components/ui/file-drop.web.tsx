import { useEffect, useRef, useState, type ReactNode } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { Mark } from './mark.tsx';

/** The browser's file input over a place to drop on: React Native has neither. */
export function FileDrop({
  id,
  accept,
  disabled,
  invalid,
  describedBy,
  filled,
  onFile,
  over,
  children,
}: {
  readonly id: string;
  readonly accept?: string;
  readonly disabled?: boolean;
  readonly invalid: boolean;
  readonly describedBy?: string;
  /** A file is chosen. */
  readonly filled: boolean;
  readonly onFile: (file: File | null | undefined) => void;
  /** Stands above the input, and is pressed by itself. */
  readonly over: ReactNode;
  readonly children: ReactNode;
}) {
  const [hovered, setHovered] = useState(false);
  return (
    <div
      onDragOver={(event) => {
        event.preventDefault();
        setHovered(true);
      }}
      onDragLeave={() => setHovered(false)}
      onDrop={(event) => {
        event.preventDefault();
        setHovered(false);
        if (disabled !== true) onFile(event.dataTransfer.files[0]);
      }}
      style={{
        position: 'relative',
        border: `${hovered ? 2 : 1}px ${filled ? 'solid' : 'dashed'} ${invalid ? roles.wrong : roles.ink}`,
        borderRadius: 3,
        background: hovered ? roles.touched : roles.sheet,
        padding: 12,
        minHeight: 72,
        display: 'flex',
        flexWrap: 'wrap',
        alignItems: 'center',
        gap: 12,
        color: roles.ink,
      }}
    >
      {children}
      <input
        id={id}
        type="file"
        accept={accept}
        disabled={disabled}
        aria-invalid={invalid}
        aria-describedby={describedBy}
        onChange={(event) => {
          onFile(event.target.files?.[0]);
          event.target.value = ''; // so that the same file can be chosen again after it was mended
        }}
        style={{
          position: 'absolute',
          inset: 0,
          width: '100%',
          height: '100%',
          opacity: 0,
          cursor: 'pointer',
          zIndex: 1,
        }}
      />
      {over === null ? null : <span style={{ position: 'relative', zIndex: 2 }}>{over}</span>}
    </div>
  );
}

/** A chosen picture before it is sent: an address of the browser's own, given back when the picture goes. */
export function Preview({ file }: { readonly file: File }) {
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
