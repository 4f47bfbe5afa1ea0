/**
 * Width of a text without a screen: advances of Geologica at weights 400 and 650, in thousandths of the size, for the
 * characters U+0020 to U+007E, read from the face itself; Commit Mono is 600 for every character.
 */
const REGULAR = [
  245, 323, 408, 634, 648, 1032, 749, 228, 346, 346, 550, 648, 269, 389, 269, 457, 680, 434, 591, 582, 601, 584, 641,
  554, 613, 629, 294, 294, 648, 648, 648, 494, 855, 694, 634, 698, 713, 613, 581, 751, 746, 295, 502, 695, 544, 914,
  752, 832, 634, 832, 665, 628, 560, 740, 662, 1019, 670, 620, 584, 346, 457, 346, 648, 545, 500, 552, 647, 516, 647,
  573, 388, 599, 616, 263, 263, 558, 263, 947, 616, 605, 647, 647, 411, 494, 430, 605, 522, 789, 536, 532, 488, 346,
  292, 346, 648,
];
const BOLD = [
  233, 342, 448, 645, 648, 1042, 764, 243, 356, 356, 573, 648, 285, 395, 285, 466, 684, 456, 596, 585, 602, 589, 647,
  568, 614, 635, 306, 306, 648, 648, 648, 510, 848, 720, 654, 699, 725, 632, 593, 752, 768, 325, 525, 727, 558, 933,
  774, 827, 654, 827, 684, 637, 575, 754, 689, 1034, 690, 644, 588, 356, 466, 356, 648, 558, 500, 575, 663, 533, 663,
  591, 414, 610, 648, 294, 294, 596, 294, 979, 648, 620, 663, 663, 438, 518, 446, 632, 554, 822, 602, 574, 510, 356,
  326, 356, 648,
];
const OTHER_CHARACTER = 700;
const MONO = 600;

export function textWidthPx(text: string, face: 'ui' | 'num', sizePx: number, weight = 400): number {
  if (face === 'num') return ([...text].length * MONO * sizePx) / 1000;
  const advances = weight >= 600 ? BOLD : REGULAR;
  let sum = 0;
  for (const character of text.replaceAll('\u00A0', ' ')) {
    const code = character.codePointAt(0) ?? 0;
    sum += advances[code - 32] ?? (code > 0x2e80 ? 1000 : OTHER_CHARACTER);
  }
  return (sum * sizePx) / 1000;
}

/** The text, or as much of it as fits with an ellipsis. */
export function fitText(text: string, maxPx: number, face: 'ui' | 'num', sizePx: number, weight = 400): string {
  if (textWidthPx(text, face, sizePx, weight) <= maxPx) return text;
  const characters = [...text];
  while (characters.length > 1) {
    characters.pop();
    const shorter = `${characters.join('').trimEnd()}…`;
    if (textWidthPx(shorter, face, sizePx, weight) <= maxPx) return shorter;
  }
  return '…';
}
