/** Programs by which people reach a page, the more particular before those that name themselves as many things. */
const PROGRAMS: readonly (readonly [name: string, pattern: RegExp])[] = [
  ["Edge", /\bEdg(?:A|iOS)?\/(\d+)/],
  ["Opera", /\bOPR\/(\d+)/],
  ["Firefox", /\b(?:Firefox|FxiOS)\/(\d+)/],
  ["Chromium", /\b(?:HeadlessChrome|Chrome|Chromium|CriOS)\/(\d+)/],
  ["Safari", /\bVersion\/(\d+)[\d.]* (?:Mobile\/\w+ )?Safari\//],
];

const SYSTEMS: readonly (readonly [name: string, pattern: RegExp])[] = [
  ["Android", /\bAndroid\b/],
  ["iPhone", /\biPhone\b/],
  ["iPad", /\biPad\b/],
  ["Windows", /\bWindows\b/],
  ["macOS", /\bMac OS X\b|\bMacintosh\b/],
  ["Linux", /\bLinux\b|\bX11\b/],
];

/**
 * The browser of a session as its owner would name it: "Firefox 140 on Linux". What is not known stands as it was sent; a
 * browser that sends nothing is "not named". It is what the browser says of itself, and proves nothing.
 */
export function agentInWords(agent: string): string {
  const text = agent.trim();
  if (text === "") return "not named";
  for (const [name, pattern] of PROGRAMS) {
    const version = pattern.exec(text)?.[1];
    if (version === undefined) continue;
    const system = SYSTEMS.find(([, sign]) => sign.test(text))?.[0];
    return system ? `${name} ${version} on ${system}` : `${name} ${version}`;
  }
  return text;
}
