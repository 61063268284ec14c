import type { StudyRole } from '../../../api/contracts/common.ts';
import { studyRoles } from '../../../api/contracts/common.ts';
import { Checkbox, CheckboxGroup } from '../../components/checkbox.tsx';
import { words } from '../../words/en.ts';

export type Duties = { roles: StudyRole[]; chair: boolean; siteIds: string[] };
export type DutyErrors = { roles?: string; siteIds?: string };
type Site = { id: string; code: string; name: string };

type DutiesFieldsProps = {
  value: Duties;
  onChange: (duties: Duties) => void;
  sites: readonly Site[];
  errors?: DutyErrors;
};

const text = words.members;

/** The duties of one person: roles, the sites of a coordinator, the chair of the board. */
export function DutiesFields({ value, onChange, sites, errors = {} }: DutiesFieldsProps) {
  return (
    <>
      <CheckboxGroup
        name="roles"
        label={text.roles}
        hint={text.rolesHint}
        values={value.roles}
        error={errors.roles}
        choices={studyRoles.map((role) => ({
          value: role,
          label: words.roles[role],
          note:
            role in text.excludes ? text.excludes[role as keyof typeof text.excludes] : undefined,
        }))}
        onChange={(chosen) => {
          const roles = studyRoles.filter((role) => chosen.includes(role));
          onChange({
            roles,
            chair: roles.includes('board member') && value.chair,
            siteIds: roles.includes('coordinator') ? value.siteIds : [],
          });
        }}
      />
      {value.roles.includes('coordinator') ? (
        <CheckboxGroup
          name="siteIds"
          label={text.sites}
          hint={text.sitesHint}
          values={value.siteIds}
          error={errors.siteIds}
          choices={sites.map(({ id, name, code }) => ({ value: id, label: name, note: code }))}
          onChange={(siteIds) => onChange({ ...value, siteIds })}
        />
      ) : null}
      {value.roles.includes('board member') ? (
        <Checkbox checked={value.chair} onChange={(chair) => onChange({ ...value, chair })}>
          {text.chair}
        </Checkbox>
      ) : null}
    </>
  );
}
