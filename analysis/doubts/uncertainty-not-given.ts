import type { DoubtTest } from './evidence.ts';
import { listText } from './wording.ts';

const mostNamed = 6;

/** Uncertainties that the sheet leaves out and that the interval therefore does not hold. */
export const uncertaintyNotGiven: DoubtTest = ({ notGiven }) => {
  if (notGiven.length === 0) return [];
  const named = notGiven.slice(0, mostNamed);
  const more = notGiven.length - named.length;
  const list = more > 0 ? `${named.join(', ')} and ${more} more` : listText(named);
  return [
    {
      code: 'uncertainty-not-given',
      message:
        `No uncertainty was given for ${list}. It was taken as 0, so the interval is too narrow. ` +
        'Give the relative standard uncertainty of each stock, standard and dilution (from the certificate, the balance and the glassware).',
    },
  ];
};
