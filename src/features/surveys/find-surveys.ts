import type { ListedSurvey } from "#shared/api/surveys.ts";

/** Small letters without accents, so that "Pelli" finds "Pélli". */
function plain(text: string): string {
  return text.normalize("NFD").replace(/\p{M}/gu, "").toLowerCase();
}

/** Whether every word of what is looked for stands in the name, what is counted, the season or the roles, in any order. */
export function isFound(survey: Pick<ListedSurvey, "name" | "target" | "season" | "roles">, text: string): boolean {
  const known = plain([survey.name, survey.target, survey.season, ...survey.roles].join(" "));
  return plain(text)
    .split(/\s+/)
    .every((word) => known.includes(word));
}
