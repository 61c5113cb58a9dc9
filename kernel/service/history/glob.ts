// Patterns of a history search.

/**
 * Matcher of a glob over the whole text: * is any run of characters, ? one. Two pointers and one step back to the last
 * star: no pattern makes it exponential.
 */
export function globMatcher(pattern: string): (text: string) => boolean {
  const glob = [...pattern];
  return (source) => {
    const text = [...source];
    let at = 0;
    let here = 0;
    let star = -1;
    let mark = 0;
    while (here < text.length) {
      if (glob[at] === "*") {
        star = at++;
        mark = here;
      } else if (at < glob.length && (glob[at] === "?" || glob[at] === text[here])) {
        at += 1;
        here += 1;
      } else if (star >= 0) {
        at = star + 1;
        here = ++mark;
      } else return false;
    }
    while (glob[at] === "*") at += 1;
    return at === glob.length;
  };
}
