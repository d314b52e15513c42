/** A choice of the bench as native radio buttons under its legend. */
import styles from './ChoiceField.module.css';

interface Props<Value extends string> {
  /** Name of the choice; its first button can be reached as `choice-<name>`. */
  readonly name: string;
  readonly legend: string;
  readonly value: Value;
  readonly options: readonly { readonly value: Value; readonly words: string; readonly more?: string }[];
  readonly onChoose: (value: Value) => void;
}

export function ChoiceField<Value extends string>({ name, legend, value, options, onChoose }: Props<Value>) {
  return (
    <fieldset className={styles.choice} id={`choice-${name}`} tabIndex={-1}>
      <legend className={styles.legend}>{legend}</legend>
      <div className={styles.options}>
        {options.map((option) => (
          <label key={option.value} className={styles.option}>
            <input type="radio" name={name} value={option.value} checked={option.value === value} onChange={() => onChoose(option.value)} />
            <span>
              {option.words}
              {option.more !== undefined && <span className="quiet"> {option.more}</span>}
            </span>
          </label>
        ))}
      </div>
    </fieldset>
  );
}
