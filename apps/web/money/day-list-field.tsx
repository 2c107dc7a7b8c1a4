import { ListField, type ListForm } from '../field/list-field.js';

const FORM: ListForm<string> = {
  read: (text) => {
    const days = text.split(/[,;\s]+/).filter((day) => day !== '');
    return days.every((day) => /^\d{4}-\d{2}-\d{2}$/.test(day)) ? days : null;
  },
  write: (days) => days.join(', '),
  needs: 'days such as 2025-12-25, with commas between',
  otherwise: 'none',
};

/** Local days as a list: "2025-12-25, 2025-12-26". */
export function DayListField({ path, label }: { path: string; label: string }) {
  return <ListField path={path} label={label} form={FORM} />;
}
