import { FLUORESCENCES, MAKE_MARKS, SHAPES } from '@foldwell/quantities';

import { Choice, Field } from '../../../components/field';
import { useMe } from '../../../lib/session';
import type { ParticularsForm } from './particulars-form';

interface Props {
  form: ParticularsForm;
  change(part: Partial<ParticularsForm>): void;
  problems: Record<string, string>;
  kind: 'stone' | 'pair' | 'parcel';
}

const make = [['', '–'], ...MAKE_MARKS.map((mark) => [mark, mark] as const)] as const;

/** The particulars of a lot, stones and parcels each with what they have. */
export function ParticularsFields({ form, change, problems, kind }: Props) {
  const {
    house: { priceCurrency: currency },
  } = useMe();
  const text = (name: keyof ParticularsForm) => ({
    value: form[name],
    onValue: (value: string) => change({ [name]: value }),
    problem: problems[name],
  });
  const isStone = kind !== 'parcel';
  return (
    <div className="grid grid-cols-2 md:grid-cols-4 xl:grid-cols-6 gap-3">
      <Choice
        label="Shape"
        {...text('shape')}
        options={SHAPES.map((shape) => [shape, shape] as const)}
      />
      {!isStone && <Field label="Sieve" {...text('sieve')} placeholder="+6.5 -11" />}
      <Field label="Colour" {...text('colour')} placeholder={isStone ? 'G' : 'F-G'} />
      <Field label="Clarity" {...text('clarity')} placeholder={isStone ? 'VS2' : 'VS1-SI1'} />
      {isStone && (
        <>
          <Choice label="Cut" {...text('cut')} options={make} />
          <Choice label="Polish" {...text('polish')} options={make} />
          <Choice label="Symmetry" {...text('symmetry')} options={make} />
          <Choice
            label="Fluorescence"
            {...text('fluorescence')}
            options={[['', '–'], ...FLUORESCENCES.map((one) => [one, one] as const)]}
          />
          <Field label="Measurements, mm" {...text('measures')} placeholder="6.42-6.45 x 3.98" />
          <Field label="Depth" unit="%" isNumber {...text('depth')} />
          <Field label="Table" unit="%" isNumber {...text('table')} />
          <Field label="Crown angle" unit="°" isNumber {...text('crownAngle')} />
          <Field label="Pavilion angle" unit="°" isNumber {...text('pavilionAngle')} />
          <Field label="Laboratory" {...text('laboratory')} />
          <Field label="Report number" {...text('report')} />
          <Field label="Stated weight" unit="ct" isNumber {...text('stated')} />
          <Field label="Inscription" {...text('inscription')} />
        </>
      )}
      <Field label="Country of mining" {...text('country')} />
      <Field label="Evidence of it" {...text('evidence')} />
      <Field label="Ask" unit={`${currency}/ct`} isNumber {...text('ask')} />
      <Field label="Comments" {...text('comments')} className="col-span-2" />
    </div>
  );
}
