/** Stands in for Deno's kernel: collects the messages a cell would send. */
import type { MimeBundle } from "../../lib/run/displayable.ts";

/** One message to the front end. */
export interface Message {
  type: string;
  data: MimeBundle;
  id: string | undefined;
}

/**
 * Runs `body` as if in a cell.
 *
 * @param body gets the list that messages are added to
 * @returns the messages sent
 */
export async function inFakeKernel(body: () => unknown): Promise<Message[]> {
  const messages: Message[] = [];
  const jupyter = {
    broadcast(type: string, content: Record<string, unknown>) {
      const transient = content.transient as { display_id?: string } | undefined;
      messages.push({ type, data: content.data as MimeBundle, id: transient?.display_id });
    },
  };
  const scope = globalThis as { Deno?: object };
  const before = Object.getOwnPropertyDescriptor(scope, "Deno");
  const value = (v: unknown) => ({ value: v, configurable: true });
  Object.defineProperty(scope, "Deno", {
    configurable: true,
    writable: true,
    value: Object.create(before?.value ?? null, {
      jupyter: value(jupyter),
      addSignalListener: value(() => {}),
      removeSignalListener: value(() => {}),
    }),
  });
  try {
    await body();
  } finally {
    if (before === undefined) delete scope.Deno;
    else Object.defineProperty(scope, "Deno", before);
  }
  return messages;
}
