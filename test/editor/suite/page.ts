/** The page the workbench is drawn on; absent in a desktop run, where pictures and keys are left out. */
const port = process.env.PLUMBLINE_BRIDGE;

export const hasPage = port !== undefined;

async function ask<T>(action: string, args: Record<string, unknown> = {}): Promise<T> {
  const response = await fetch(`http://127.0.0.1:${port}`, {
    method: "POST",
    body: JSON.stringify({ action, ...args }),
  });
  const { answer, error } = (await response.json()) as { answer?: T; error?: string };
  if (error !== undefined) throw new Error(`${action}: ${error}`);
  return answer as T;
}

/** Something that keeps a reader out. */
export interface Fault {
  readonly id: string;
  readonly impact: "minor" | "moderate" | "serious" | "critical" | null;
  readonly where: readonly string[];
}

export const page = {
  screenshot: (name: string) => ask<null>("screenshot", { name }),
  press: (keys: string) => ask<null>("press", { keys }),
  type: (text: string) => ask<null>("type", { text }),
  texts: (selector: string) => ask<string[]>("texts", { selector }),
  frames: () => ask<string[]>("frames"),
  appears: (selector: string) => ask<null>("appears", { selector }),
  hover: (selector: string, text: string) => ask<null>("hover", { selector, text }),
  click: (selector: string, text: string) => ask<null>("click", { selector, text }),
  pullUp: (selector: string, pixels: number) => ask<null>("pullUp", { selector, pixels }),
  scroll: (selector: string, notches: number) => ask<null>("scroll", { selector, notches }),
  framed: (selector: string) => ask<string[]>("framed", { selector }),
  reveal: (selector: string) => ask<null>("reveal", { selector }),
  faults: (selector: string) => ask<Fault[]>("faults", { selector }),
  opened: () => ask<string>("opened"),
  away: () => ask<null>("away"),
};
