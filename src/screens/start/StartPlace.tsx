/** The two doors: the demo class, or a class from a file. */

import { goTo } from "../frame/useRoute.ts";
import { Button, EmptyState } from "../parts/index.ts";
import { useWorkbench } from "../workbench/workbench.ts";

export function StartPlace() {
  const { client, openClass } = useWorkbench();
  const openDemo = async (): Promise<void> => {
    const { classId } = await client.ask("openDemo", {});
    await openClass(classId);
    goTo("price-model");
  };
  return (
    <EmptyState sentence="Open the demo class, or start a class from a file of sales.">
      <Button primary onClick={() => void openDemo()}>
        Open the demo class
      </Button>
    </EmptyState>
  );
}
