import type { InstallationSettings } from "#shared/api/installation.ts";
import { baseMapOrigins } from "#shared/api/base-map.ts";
import type { ComparedField } from "../../components/ui/two-versions.ts";

/** The settings as they are typed. */
export interface TypedSettings {
  readonly publicAddress: string;
  readonly hasMap: boolean;
  readonly url: string;
  readonly attribution: string;
}

export type LacksOfSettings = Partial<Record<"publicAddress" | "url" | "attribution", string>>;

export function typedOf({ publicAddress, baseMap }: InstallationSettings): TypedSettings {
  return {
    publicAddress: publicAddress ?? "",
    hasMap: baseMap !== null,
    url: baseMap?.url ?? "",
    attribution: baseMap?.attribution ?? "",
  };
}

export function settingsOf({ publicAddress, hasMap, url, attribution }: TypedSettings): InstallationSettings {
  return {
    publicAddress: publicAddress.trim() === "" ? null : publicAddress.trim(),
    baseMap: hasMap ? { url: url.trim(), attribution: attribution.trim() } : null,
  };
}

function isAddress(text: string): boolean {
  if (!URL.canParse(text)) return false;
  const { protocol, search, hash } = new URL(text);
  return (protocol === "http:" || protocol === "https:") && search === "" && hash === "";
}

/** What a field lacks, with what would do. */
export function lacksOf({ publicAddress, hasMap, url, attribution }: TypedSettings): LacksOfSettings {
  const address = publicAddress.trim();
  return {
    ...(address !== "" &&
      !isAddress(address) && { publicAddress: "Write the whole address, with https:// or http:// at its beginning." }),
    ...(hasMap &&
      baseMapOrigins(url.trim()) === null && {
        url: "Write an address that holds {z}, {x} and {y}: https://tiles.example.org/{z}/{x}/{y}.png",
      }),
    ...(hasMap && attribution.trim() === "" && { attribution: "Write whom the map’s makers want to be named." }),
  };
}

/** For the page that shows two versions: address and map are chosen each as a whole. */
export const COMPARED: readonly ComparedField<InstallationSettings>[] = [
  { key: "publicAddress", label: "Public address", text: ({ publicAddress }) => publicAddress ?? "none" },
  {
    key: "baseMap",
    label: "Base map",
    text: ({ baseMap }) => (baseMap === null ? "none" : `${baseMap.url}\n${baseMap.attribution}`),
  },
];
