/** A plain check that markup is well formed: every element that is opened is closed, in order. */

const VOID = new Set(["meta", "br", "img", "input", "hr", "link"]);

/**
 * What is wrong with HTML or XML text, as far as nesting and quoting go.
 *
 * @param text a document or a fragment; comments and the text of `<style>` are passed over
 * @returns the first problem, or undefined
 */
export function markupProblem(text: string): string | undefined {
  const open: string[] = [];
  const tag =
    /<!--[\s\S]*?-->|<!DOCTYPE[^>]*>|<(\/?)([A-Za-z][\w:-]*)((?:\s+[\w:-]+(?:="[^"<>]*")?)*)\s*(\/?)>|[<>]/g;
  const body = text.replace(/<style>[\s\S]*?<\/style>/g, "");
  for (const match of body.matchAll(tag)) {
    const [whole, slash, name, , self] = match;
    if (whole.startsWith("<!")) continue;
    if (name === undefined) {
      return `a stray ${whole} near ${body.slice(match.index, match.index + 60)}`;
    }
    if (self === "/" || VOID.has(name.toLowerCase())) continue;
    if (slash === "") open.push(name);
    else if (open.pop() !== name) return `</${name}> closes something else`;
  }
  return open.length === 0 ? undefined : `<${open.pop()}> is never closed`;
}
