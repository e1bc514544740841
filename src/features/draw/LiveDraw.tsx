import { type ReactNode, useMemo, useState } from "react";
import { Link } from "react-router-dom";
import type { DrawDetail, DrawEntry } from "#shared/api/draw.ts";
import { withReplacement } from "#shared/draw/design.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { Facts } from "../../components/ui/Facts.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatNumber } from "../../components/ui/format.ts";
import { Hash } from "../../components/ui/Hash.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Seed } from "../../components/ui/Seed.tsx";
import { Tabs } from "../../components/ui/Tabs.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { FrameSheetMap } from "../../map/FrameSheetMap.tsx";
import { LegendEntry } from "../../map/LegendEntry.tsx";
import { PicksLayer } from "../../map/PicksLayer.tsx";
import { DeclarationFacts } from "./DeclarationFacts.tsx";
import { DESIGN_TITLES, picksSentence, repeatsSentence, seedOrigin } from "./draw-words.ts";
import { PicksTable } from "./PicksTable.tsx";
import { useWithdraw } from "./queries.ts";
import { ReasonDialog } from "./ReasonDialog.tsx";
import { RecipeDialog } from "./RecipeDialog.tsx";
import { sheetPicks } from "./sheet-picks.ts";

interface LiveDrawProps {
  readonly surveyId: string;
  readonly draw: DrawDetail;
  readonly mayDraw: boolean;
  readonly mayRepeat: boolean;
  readonly fieldTo: string;
  readonly recordTo: string;
  /** What was refused because somebody else had acted meanwhile. */
  readonly notice: ReactNode;
  /** Declarations and draws before this one. */
  readonly history: ReactNode;
}

/** The draw in use: what it is, where its seed comes from, its cells on the map and in draw order. */
export function LiveDraw(props: LiveDrawProps) {
  const { surveyId, draw, mayDraw, mayRepeat, fieldTo, recordTo, notice, history } = props;
  const [withdrawing, setWithdrawing] = useState(false);
  const [repeating, setRepeating] = useState(false);
  const withdraw = useWithdraw(surveyId);
  const { declaration, entries } = draw;
  return (
    <ReadingPage
      title={picksSentence(draw)}
      lead={repeatsSentence(entries, withReplacement(declaration.design.kind))}
      actions={
        mayDraw ? (
          <>
            <Button onClick={() => setWithdrawing(true)}>Withdraw…</Button>
            <ButtonLink variant="primary" to={fieldTo}>
              Share out to crews
            </ButtonLink>
          </>
        ) : undefined
      }
      band={<DrawFacts draw={draw} onRepeat={mayRepeat ? () => setRepeating(true) : undefined} />}
    >
      {notice}
      <DrawBody surveyId={surveyId} draw={draw} recordTo={recordTo} />
      <Fold quiet title="As declared" aside="before the seed existed">
        <DeclarationFacts declaration={declaration} />
      </Fold>
      {history}
      <ReasonDialog
        open={withdrawing}
        onOpenChange={setWithdrawing}
        title={`Withdraw draw ${draw.number}?`}
        lead="Its picks stay on record and counts that were entered stay too, but nothing is estimated from it any more. A new draw can be declared afterwards."
        act="Withdraw the draw"
        busy={withdraw.isPending}
        error={withdraw.error}
        onReason={(reason) => withdraw.mutate({ id: draw.id, reason }, { onSuccess: () => setWithdrawing(false) })}
      />
      <RecipeDialog surveyId={surveyId} drawId={draw.id} open={repeating} onOpenChange={setRepeating} />
    </ReadingPage>
  );
}

function DrawFacts({ draw, onRepeat }: { readonly draw: DrawDetail; readonly onRepeat: (() => void) | undefined }) {
  const times = useTimes();
  const { declaration } = draw;
  return (
    <Facts
      items={[
        { key: "Seed, as text", value: declaration.seed === null ? "none" : <Seed value={declaration.seed.text} /> },
        {
          key: "Where it comes from",
          value: (
            <>
              {seedOrigin(declaration)}
              <br />
              {declaration.seed !== null && times.time(declaration.seed.at)}
            </>
          ),
        },
        {
          key: "Design",
          value: (
            <>
              {DESIGN_TITLES[declaration.design.kind]}
              <br />
              generator {declaration.generator}
            </>
          ),
        },
        {
          key: `Frame version ${declaration.frameNumber}`,
          value: (
            <>
              <Hash value={declaration.frameSha256} label="frame hash" />
              <br />
              {onRepeat !== undefined && (
                <Button variant="link" size="small" onClick={onRepeat}>
                  Repeat it yourself
                </Button>
              )}
            </>
          ),
        },
      ]}
    />
  );
}

/** Map and list; choosing a cell in one shows it in the other. */
function DrawBody({ surveyId, draw, recordTo }: Pick<LiveDrawProps, "surveyId" | "draw" | "recordTo">) {
  const [chosen, setChosen] = useState<string | null>(null);
  const picks = useMemo(() => sheetPicks(draw.entries), [draw.entries]);
  const { used, waiting } = useMemo(() => {
    const waits = ({ state }: DrawEntry) => state === "reserve" || state === "passed-over";
    return { used: draw.entries.filter((entry) => !waits(entry)), waiting: draw.entries.filter(waits) };
  }, [draw.entries]);
  const choose = (unit: string) => setChosen((before) => (before === unit ? null : unit));
  return (
    <div className="q-map-and-list">
      <FrameSheetMap
        surveyId={surveyId}
        frameId={draw.frameId}
        label={`Cells of draw ${draw.number}`}
        tall
        legend={
          <>
            <LegendEntry symbol="drawn">drawn, with its order</LegendEntry>
            <LegendEntry symbol="repeat">drawn again, visited once</LegendEntry>
            <LegendEntry symbol="reserve">reserve</LegendEntry>
            <LegendEntry symbol="chosen">chosen in the list</LegendEntry>
          </>
        }
      >
        {({ spec, clip }) => <PicksLayer picks={picks} spec={spec} clip={clip} chosen={chosen} onChoose={choose} />}
      </FrameSheetMap>
      <Tabs
        label="Entries of the draw"
        tabs={[
          {
            id: "picks",
            label: `Picks ${formatNumber(used.length)}`,
            content: <PicksTable caption="Picks in draw order" entries={used} chosen={chosen} onChoose={choose} />,
          },
          {
            id: "reserves",
            label: `Reserves ${formatNumber(waiting.length)}`,
            content:
              waiting.length === 0 ? (
                <p className="q-help py-3">No reserve is left.</p>
              ) : (
                <PicksTable caption="Reserves in order" entries={waiting} chosen={chosen} onChoose={choose} />
              ),
          },
        ]}
        note={<Link to={recordTo}>on record</Link>}
      />
    </div>
  );
}
