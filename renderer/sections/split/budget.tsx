import {
  type AliquotResult,
  budgetAdvice,
  figuresText,
  type Sheet,
  speciesLabel,
} from '../../../analysis/index.ts';

const smallestShare = 0.005;

/** What the uncertainty is made of, largest first, with what to improve first. */
export function Budget({
  sheet,
  result,
}: {
  readonly sheet: Sheet;
  readonly result: AliquotResult;
}) {
  const advice = budgetAdvice(result.budget);
  if (advice === null) return null;
  const shown = result.budget.filter(({ share }) => share >= smallestShare);
  const [product] = result.split;
  return (
    <div class="budget">
      <h3>What the uncertainty is made of</h3>
      <p class="soft">
        Shares of the variance of the first product's fraction
        {product ? ` (${speciesLabel(sheet, product.species)})` : ''}. {advice}
      </p>
      <ul>
        {shown.map(({ source, share }) => (
          <li key={source}>
            <span class="budget-name">{source}</span>
            <span class="budget-bar">
              <span style={{ width: `${100 * share}%` }} />
            </span>
            <span class="budget-share">{figuresText(100 * share)} %</span>
          </li>
        ))}
      </ul>
    </div>
  );
}
