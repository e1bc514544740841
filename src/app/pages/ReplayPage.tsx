import { ReplayStage } from "../../features/record/ReplayStage.tsx";

export function ReplayPage() {
  return <ReplayStage />;
}
