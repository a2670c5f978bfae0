import { Field } from '@/components/ui/field'
import { faultOf, type Trouble } from '@/components/ui/use-outcome'
import type { Role } from '@/lib/core/actor'

export type PersonValues = Readonly<{ givenName: string; familyName: string; email: string | null; userName: string | null; roles: readonly Role[] }>

const roles = [
  ['teacher', 'owns papers and classes'],
  ['marker', 'marks the questions given to them'],
  ['moderator', 'second-marks the samples given to them'],
  ['admin', 'people, classes, settings; sees no marks'],
] as const

/** The fields of a person of the staff, filled with `of` when there is one already. */
export function PersonFields({ of, trouble }: { of?: PersonValues; trouble: Trouble | null }) {
  return (
    <div className="grid gap-3">
      <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
        <Field label="Given name" name="givenName" defaultValue={of?.givenName} required bad={faultOf(trouble, 'givenName')} />
        <Field label="Family name" name="familyName" defaultValue={of?.familyName} required bad={faultOf(trouble, 'familyName')} />
      </div>
      <Field label="E-mail" name="email" type="email" defaultValue={of?.email ?? ''} bad={faultOf(trouble, 'email')} say="An invitation goes here" />
      <Field label="User name" name="userName" autoCapitalize="none" spellCheck={false} defaultValue={of?.userName ?? ''} bad={faultOf(trouble, 'userName')} say="Instead of the e-mail, or beside it" />
      <fieldset className="m-0 border-0 p-0">
        <legend className="mb-1 p-0 text-[length:var(--t-1)] leading-5 font-medium">Roles</legend>
        <div className="grid gap-1">
          {roles.map(([role, does]) => (
            <label key={role} className="chk"><input type="checkbox" name="roles" value={role} defaultChecked={of?.roles.includes(role)} /> {role} <small className="soft">{does}</small></label>
          ))}
        </div>
        {faultOf(trouble, 'roles') && <p className="alarm small mt-1">! {faultOf(trouble, 'roles')}</p>}
      </fieldset>
    </div>
  )
}

/** What the fields say, as the action reads it. */
export function personOf(form: HTMLFormElement): PersonValues {
  const data = new FormData(form)
  const text = (name: string) => String(data.get(name) ?? '')
  return { givenName: text('givenName'), familyName: text('familyName'), email: text('email'), userName: text('userName'), roles: data.getAll('roles') as Role[] }
}
