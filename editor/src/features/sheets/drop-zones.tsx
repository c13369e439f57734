import { type DragEvent, useState } from 'react';
import { UploadIcon } from '../../components/icons';
import type { SheetView } from '../../lib/sheets';
import styles from './sheets.module.css';

const kinds = {
  photo: {
    title: 'Add yard photos',
    text: 'JPEG, PNG, WebP or HEIC, up to 40\u00a0MB',
    accept: 'image/jpeg,image/png,image/webp,image/heic,image/heif,.heic,.heif',
  },
  plan: {
    title: 'Add a plot plan',
    text: 'PDF of up to 50 pages, or an image, up to 40\u00a0MB',
    accept: 'application/pdf,image/jpeg,image/png,image/webp,.pdf',
  },
} as const satisfies Record<SheetView, { title: string; text: string; accept: string }>;

interface DropZonesProps {
  readonly onFiles: (files: readonly File[], view: SheetView) => void;
}

/** Two places to drop files on; each is a file button as well, which is the way by keyboard and on a phone. */
export function DropZones({ onFiles }: DropZonesProps) {
  return (
    <div className={styles.zones}>
      <Zone view="photo" onFiles={onFiles} />
      <Zone view="plan" onFiles={onFiles} />
    </div>
  );
}

function Zone({ view, onFiles }: DropZonesProps & { view: SheetView }) {
  const [over, setOver] = useState(false);
  const { title, text, accept } = kinds[view];
  const take = (list: FileList | null) => {
    const files = Array.from(list ?? []);
    if (files.length > 0) onFiles(files, view);
  };
  const hover = (event: DragEvent) => {
    event.preventDefault();
    setOver(true);
  };
  return (
    <label
      className={styles.zone}
      data-over={over ? '' : undefined}
      onDragEnter={hover}
      onDragOver={hover}
      onDragLeave={() => setOver(false)}
      onDrop={(event) => {
        event.preventDefault();
        setOver(false);
        take(event.dataTransfer.files);
      }}
    >
      <UploadIcon />
      <span>
        <strong>{title}</strong>
        <small>{text}</small>
      </span>
      <input
        type="file"
        className="visually-hidden"
        accept={accept}
        multiple
        onChange={(event) => {
          take(event.target.files);
          // The same file may be chosen again after a failure.
          event.target.value = '';
        }}
      />
    </label>
  );
}
