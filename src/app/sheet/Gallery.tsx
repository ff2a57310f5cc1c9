/** The models that come with the program, each with what it is for. */
import { useEffect, useRef, useState } from 'react';
import { readArm } from '../../arm/readArm.ts';
import { type Model, models } from '../store/gallery.ts';

interface Shown {
  readonly model: Model;
  readonly text: string;
  readonly name: string;
  readonly note: string;
  readonly joints: string;
}

export interface GalleryProps {
  readonly onClose: () => void;
  readonly open: (name: string, text: string) => boolean;
}

export function Gallery({ onClose, open }: GalleryProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  const [shown, setShown] = useState<readonly Shown[]>([]);
  useEffect(() => {
    dialog.current?.showModal();
    let wanted = true;
    Promise.all(models.map(describe)).then((all) => {
      if (wanted) setShown(all.flatMap((each) => (each ? [each] : [])));
    });
    return () => {
      wanted = false;
    };
  }, []);
  return (
    <dialog ref={dialog} className="gallery" aria-labelledby="gallery-title" onClose={onClose}>
      <header>
        <h2 id="gallery-title">Models</h2>
        <button type="button" onClick={() => dialog.current?.close()}>
          Close
        </button>
      </header>
      <ul>
        {shown.map(({ model, text, name, note, joints }) => (
          <li key={model.file}>
            <button
              type="button"
              onClick={() => {
                open(model.file, text);
                dialog.current?.close();
              }}
            >
              <b>{name}</b>
              <span className="joints">{joints}</span>
              <span className="note">{note}</span>
            </button>
          </li>
        ))}
      </ul>
    </dialog>
  );
}

async function describe(model: Model): Promise<Shown | null> {
  const text = await model.text();
  const reading = readArm(text);
  if (!reading.ok) return null;
  const turning = reading.arm.joints.filter((joint) => joint.kind === 'revolute');
  const kinds = turning.map((joint) => joint.support?.arrangement ?? 'no support');
  const count = (kind: string) => kinds.filter((each) => each === kind).length;
  const parts = ['clevis', 'cantilever', 'ring', 'no support'].flatMap((kind) =>
    count(kind) > 0 ? [`${count(kind)} ${kind}`] : [],
  );
  const joints = `${turning.length} ${turning.length === 1 ? 'joint' : 'joints'}: ${parts.join(', ')}`;
  return { model, text, name: reading.arm.name, note: reading.arm.note ?? '', joints };
}
