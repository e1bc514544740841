import type { FrameVersion } from "#shared/api/frame.ts";
import { Field } from "../../components/ui/Field.tsx";
import { formatCount } from "../../components/ui/format.ts";
import { Select } from "../../components/ui/Select.tsx";

interface FrameVersionsProps {
  readonly frames: readonly FrameVersion[];
  /** The sealed version that is shown; null while the draft is. */
  readonly shown: string | null;
  /** Number of the version in work, where there is one. */
  readonly draft: number | null;
  readonly onShow: (frameId: string) => void;
}

const DRAFT = "draft";

/** Which version is shown, where there is more than one. `onShow` is told "draft" for the one in work. */
export function FrameVersions({ frames, shown, draft, onShow }: FrameVersionsProps) {
  const sealed = frames.flatMap((frame) => (frame.sealed === null ? [] : [{ frame, seal: frame.sealed }]));
  const options = [
    ...(draft === null ? [] : [{ value: DRAFT, label: `Version ${draft}, not sealed` }]),
    ...sealed.map(({ frame, seal }) => ({
      value: frame.id,
      label: `Version ${frame.number}, sealed: ${formatCount(seal.units, "cell")}`,
    })),
  ];
  if (options.length < 2) return null;
  return (
    <div className="mb-3">
      <Field label="Version">
        <Select value={shown ?? DRAFT} options={options} onChange={(event) => onShow(event.target.value)} />
      </Field>
    </div>
  );
}
