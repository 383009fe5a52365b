import {
  addSpecies,
  removeSpecies,
  renameSpecies,
  type SheetSpecies,
  setReaction,
  speciesName,
  updateSpecies,
  whyNotRename,
} from '../../../analysis/index.ts';
import { Choice, Field } from '../../fields/field.tsx';
import { NumberField } from '../../fields/number-field.tsx';
import { parseNumber, parsePositive, shown } from '../../fields/parse-entry.ts';
import { RemoveButton } from '../../fields/remove-button.tsx';
import { SpeciesGlyph } from '../../species/species-glyph.tsx';
import type { SectionProps } from '../section.ts';

export function reactionSummary({ sheet }: SectionProps): string {
  const { core, arm, sites } = sheet.reaction;
  return `${speciesName(sheet, core)} (${sites} sites) + ${speciesName(sheet, arm)}; ${sheet.species.length} species`;
}

export function ReactionSection({ sheet, change }: SectionProps) {
  const species = sheet.species.map(({ id }) => ({ value: id, text: speciesName(sheet, id) }));
  return (
    <>
      <p class="sentence">
        The core{' '}
        <Choice
          label="Core"
          value={sheet.reaction.core}
          options={species}
          choose={(core) => change('choose core', (before) => setReaction(before, { core }))}
        />{' '}
        carries{' '}
        <Field
          label="Sites on the core"
          value={shown(sheet.reaction.sites)}
          commit={(text) => {
            const entry = parseNumber(text);
            if (!entry.ok) return entry.message;
            const sites = entry.value;
            if (sites === undefined || !Number.isInteger(sites) || sites < 1 || sites > 12) {
              return 'A whole number from 1 to 12.';
            }
            change('set sites', (before) => setReaction(before, { sites }));
            return null;
          }}
        />{' '}
        sites, each of which takes one arm{' '}
        <Choice
          label="Arm"
          value={sheet.reaction.arm}
          options={species}
          choose={(arm) => change('choose arm', (before) => setReaction(before, { arm }))}
        />
        .
      </p>
      <table class="ledger">
        <thead>
          <tr>
            <th scope="col">Species</th>
            <th scope="col">id</th>
            <th scope="col" class="number">
              cores
            </th>
            <th scope="col" class="number">
              arms
            </th>
            <th scope="col">absorbs</th>
            <th scope="col" class="number">
              molar mass, g/mol
            </th>
            <th scope="col">
              <span class="unseen">Remove</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {sheet.species.map((each) => (
            <SpeciesRow key={each.id} sheet={sheet} species={each} change={change} />
          ))}
        </tbody>
      </table>
      <button
        type="button"
        class="quiet"
        onClick={() =>
          change('add species', (before) => addSpecies(before, { name: '', cores: 0, arms: 0 }))
        }
      >
        Add a species
      </button>
    </>
  );
}

type RowProps = Pick<SectionProps, 'sheet' | 'change'> & { readonly species: SheetSpecies };

function SpeciesRow({ sheet, species, change }: RowProps) {
  const { id, name = '', cores, arms, absorbs, molarMassGPerMol } = species;
  const called = name || id;
  const isFixed = id === sheet.reaction.core || id === sheet.reaction.arm;
  const countCommit = (member: 'cores' | 'arms') => (text: string) => {
    const entry = parseNumber(text);
    if (!entry.ok) return entry.message;
    const value = entry.value;
    if (value === undefined || !Number.isInteger(value) || value < 0) return 'A whole number.';
    change(`set ${member}`, (before) => updateSpecies(before, id, { [member]: value }));
    return null;
  };
  return (
    <tr>
      <td>
        <span class="with-glyph">
          <SpeciesGlyph sheet={sheet} id={id} />
          <Field
            label={`Name of ${id}`}
            value={name}
            placeholder={id}
            commit={(text) => {
              change('name species', (before) => updateSpecies(before, id, { name: text.trim() }));
              return null;
            }}
          />
        </span>
      </td>
      <td class="short soft">
        <Field
          label={`Id of ${called}`}
          value={id}
          title="Short name, for labels on curves and for the command line"
          commit={(text) => {
            const next = text.trim();
            const problem = whyNotRename(sheet, id, next);
            if (problem === null) change('set id', (before) => renameSpecies(before, id, next));
            return problem;
          }}
        />
      </td>
      <td class="number">
        <Field
          label={`Cores in ${called}`}
          align="right"
          value={shown(cores)}
          commit={countCommit('cores')}
        />
      </td>
      <td class="number">
        <Field
          label={`Arms in ${called}`}
          align="right"
          value={shown(arms)}
          commit={countCommit('arms')}
        />
      </td>
      <td>
        <input
          type="checkbox"
          aria-label={`${called} absorbs`}
          checked={absorbs !== false}
          onChange={(event) => {
            const next = event.currentTarget.checked;
            change('set absorbs', (before) => updateSpecies(before, id, { absorbs: next }));
          }}
        />
      </td>
      <td class="number">
        <NumberField
          label={`Molar mass of ${called}`}
          value={molarMassGPerMol}
          placeholder="–"
          parse={parsePositive}
          take={(value) =>
            change('set molar mass', (before) =>
              updateSpecies(before, id, { molarMassGPerMol: value }),
            )
          }
        />
      </td>
      <td>
        {!isFixed && (
          <RemoveButton
            what={called}
            title={`Remove ${called}, with its standards`}
            remove={() => change(`remove ${called}`, (before) => removeSpecies(before, id))}
          />
        )}
      </td>
    </tr>
  );
}
