import { Button } from "../../components/ui/Button.tsx";
import { CodeBlock } from "../../components/ui/CodeBlock.tsx";
import { Dialog } from "../../components/ui/Dialog.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { Tabs } from "../../components/ui/Tabs.tsx";
import { useRecipe } from "./queries.ts";

interface RecipeDialogProps {
  readonly surveyId: string;
  readonly drawId: string;
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
}

/** How to repeat the draw without Quillet: one line of shell a pick, or a short Python script. */
export function RecipeDialog({ surveyId, drawId, open, onOpenChange }: RecipeDialogProps) {
  const recipe = useRecipe(surveyId, drawId, open);
  return (
    <Dialog
      wide
      open={open}
      onOpenChange={onOpenChange}
      title="Repeat this draw yourself"
      lead="With nothing of ours: Python’s standard library, or the tools of a shell."
      actions={<Button onClick={() => onOpenChange(false)}>Close</Button>}
    >
      {recipe.isPending && <RuledLoading label="Loading the recipe" />}
      {recipe.isError && <Refusal error={recipe.error} />}
      {recipe.data !== undefined && (
        <Tabs
          label="Recipes"
          tabs={[
            { id: "python", label: "Python", content: <CodeBlock code={recipe.data.python} label="Python recipe" /> },
            { id: "shell", label: "Shell", content: <CodeBlock code={recipe.data.shell} label="shell recipe" /> },
          ]}
        />
      )}
    </Dialog>
  );
}
