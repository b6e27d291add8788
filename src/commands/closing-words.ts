/** What stands under every page of figures. */
export const closingWords =
  "RF figures are trends: read the scanner's own displayed values before starting, follow the implant's label and local rules. " +
  'Figures come from published population values, not from this patient. Holdfast proposes, people decide; it is not a medical device.';
