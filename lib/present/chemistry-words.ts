/** Chemistries as people in the trade write them, by the code's name. */
export const CHEMISTRY_WORDS: Readonly<Record<string, string>> = {
  alkaline: "Alkaline",
  "zinc-carbon": "Zinc-carbon",
  "li-fes2": "Li-FeS₂",
  "li-socl2": "Li-SOCl₂",
  "li-mno2": "Li-MnO₂",
  "silver-oxide": "Silver oxide",
  vrla: "Lead-acid (VRLA)",
  lifepo4: "LiFePO₄",
};
