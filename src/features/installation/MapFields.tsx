import { useEffect, useMemo, useState } from "react";
import type { SurveySummary } from "#shared/api/surveys.ts";
import { baseMapOrigins } from "#shared/api/base-map.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { RadioCards } from "../../components/ui/RadioCards.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { AreaOutline } from "../../map/AreaOutline.tsx";
import { type BaseMap, BaseMapContext } from "../../map/base-map-context.ts";
import { localPlane } from "../../map/planes.ts";
import { SheetMap } from "../../map/SheetMap.tsx";
import type { LacksOfSettings, TypedSettings } from "./settings-form.ts";

/** A study area to look at the map with; null where the owner has none of their own. */
export type PreviewOutline = SurveySummary["outline"];

interface MapFieldsProps {
  readonly typed: TypedSettings;
  readonly lacks: LacksOfSettings;
  readonly onChange: (part: Partial<TypedSettings>) => void;
  readonly outline: PreviewOutline;
  /** What is typed is what is kept. */
  readonly isKept: boolean;
}

/** Pictures below every sheet, from an XYZ template, or none. */
export function MapFields({ typed, lacks, onChange, outline, isKept }: MapFieldsProps) {
  return (
    <div id="map" className="min-w-0">
      <Section
        title="Map"
        lead="The sheets read without one. With a base map, its pictures lie pale and grey below everything else."
      >
        <div className="grid gap-5">
          <RadioCards<"none" | "tiles">
            legend="Base map"
            value={typed.hasMap ? "tiles" : "none"}
            onChange={(choice) => onChange({ hasMap: choice === "tiles" })}
            options={[
              { value: "none", title: "None", text: "Nothing is fetched from anywhere else." },
              {
                value: "tiles",
                title: "Pictures from a map server",
                text: "Whoever runs it learns which places your people look at.",
              },
            ]}
          />
          {typed.hasMap && (
            <>
              <div className="grid max-w-160 gap-5">
                <Field
                  label="XYZ template"
                  error={lacks.url}
                  help="With {z}, {x} and {y}; {s} for the servers a, b and c, {r} for pictures of double size."
                >
                  <TextInput
                    name="url"
                    autoComplete="off"
                    autoCapitalize="none"
                    spellCheck={false}
                    mono
                    placeholder="https://tiles.example.org/{z}/{x}/{y}.png"
                    value={typed.url}
                    onChange={(event) => onChange({ url: event.target.value })}
                  />
                </Field>
                <Field
                  label="Attribution"
                  error={lacks.attribution}
                  help="Whom its makers want to be named. It is printed in the margin of every sheet."
                >
                  <TextInput
                    name="attribution"
                    autoComplete="off"
                    value={typed.attribution}
                    onChange={(event) => onChange({ attribution: event.target.value })}
                  />
                </Field>
              </div>
              <SettledPreview typed={typed} outline={outline} isKept={isKept} />
            </>
          )}
        </div>
      </Section>
    </div>
  );
}

/** ms without a key pressed before pictures are fetched. */
const SETTLED_AFTER = 600;

/** The preview of what was typed last, once the typing has come to rest: half an address is not asked of anybody. */
function SettledPreview({ typed, outline, isKept }: Pick<MapFieldsProps, "typed" | "outline" | "isKept">) {
  const url = typed.url.trim();
  const [settled, setSettled] = useState(url);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(url), SETTLED_AFTER);
    return () => clearTimeout(timer);
  }, [url]);
  if (settled !== url || baseMapOrigins(url) === null) return null;
  return (
    <MapPreview key={url} baseMap={{ url, attribution: typed.attribution.trim() }} outline={outline} isKept={isKept} />
  );
}

/** About 40 km across, where no area of one's own can be shown. */
const ANYWHERE: NonNullable<PreviewOutline> = [
  [
    [
      [8.3, 47.0],
      [8.8, 47.0],
      [8.8, 47.3],
      [8.3, 47.3],
    ],
  ],
];

interface MapPreviewProps {
  readonly baseMap: BaseMap;
  readonly outline: PreviewOutline;
  readonly isKept: boolean;
}

/** The map as sheets will have it. A browser that loaded this page before the map was kept may not fetch its pictures yet. */
function MapPreview({ baseMap, outline, isKept }: MapPreviewProps) {
  const shown = outline === null || outline.length === 0 ? ANYWHERE : outline;
  const plane = useMemo(() => localPlane(shown), [shown]);
  const [isBlocked, setIsBlocked] = useState(false);
  useEffect(() => {
    const onViolation = (event: SecurityPolicyViolationEvent) => {
      if (event.effectiveDirective === "img-src") setIsBlocked(true);
    };
    document.addEventListener("securitypolicyviolation", onViolation);
    return () => document.removeEventListener("securitypolicyviolation", onViolation);
  }, []);
  return (
    <div className="grid min-w-0 max-w-160 gap-3">
      <BaseMapContext value={baseMap}>
        <SheetMap
          label="Preview of the base map"
          bounds={plane.bounds}
          crsName={null}
          lngLatOf={plane.lngLatOf}
          height={340}
        >
          {shown === outline && <AreaOutline polygons={plane.polygons} />}
        </SheetMap>
      </BaseMapContext>
      {isBlocked && (
        <Banner
          title="This page may not fetch from there yet."
          next={isKept ? <Button onClick={() => globalThis.location.reload()}>Load the page again</Button> : undefined}
        >
          {isKept
            ? "The map is kept; the browser learns of it with the next page that it loads."
            : "Keep the map first; then load the page again to see it."}
        </Banner>
      )}
    </div>
  );
}
