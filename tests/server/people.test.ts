import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { people } from '../../server/database/schema/people'
import { checkSession } from '../../server/services/people/check-session'
import { listPeople } from '../../server/services/people/list-people'
import { addPerson, changePerson, resetPassword, setPersonDisabled } from '../../server/services/people/manage-people'
import { signIn } from '../../server/services/people/sign-in'
import { signOut } from '../../server/services/people/sign-out'
import { addPerson as addTestPerson, addPlant, as, openTestServices, PASSWORD } from './support/services'

function opened() {
  const { services, setTime } = openTestServices()
  const plant = addPlant(services)
  const administrator = addTestPerson(services, 'administrator', { email: 'admin@kestrelfold.example' })
  return { services, setTime, ...plant, administrator, administering: as(services, administrator) }
}
const who = { email: 'inspector@kestrelfold.example', password: PASSWORD, address: '10.0.0.1' }

describe('sessions', () => {
  it('last until signed out, and a copied cookie is worth nothing then', async () => {
    const { services, inspector } = opened()
    const { sessionId, actor } = await signIn(services, who)
    expect(actor).toMatchObject({ name: 'Ines Falkenrath', role: 'inspector' })
    expect(checkSession(services, sessionId)).toEqual(inspector)
    signOut(as(services, actor), sessionId)
    expect(checkSession(services, sessionId)).toBeNull()
  })

  it('end after twelve idle hours, not a minute before', async () => {
    const { services, setTime } = opened()
    const { sessionId } = await signIn(services, who)
    setTime('2026-12-01T19:59:00.000Z')
    expect(checkSession(services, sessionId)).not.toBeNull()
    setTime('2026-12-02T07:59:01.000Z')
    expect(checkSession(services, sessionId)).toBeNull()
  })

  it('end at once when the person is disabled, the password is reset, or the role changes', async () => {
    const { services, administering, inspector } = opened()
    const first = await signIn(services, who)
    setPersonDisabled(administering, inspector.personId, true)
    expect(checkSession(services, first.sessionId)).toBeNull()
    await expect(signIn(services, who)).rejects.toMatchObject({ code: 'wrong-password' })
    setPersonDisabled(administering, inspector.personId, false)
    const second = await signIn(services, who)
    await resetPassword(administering, inspector.personId, 'quite another password')
    expect(checkSession(services, second.sessionId)).toBeNull()
    await expect(signIn(services, who)).rejects.toMatchObject({ code: 'wrong-password' })
    const third = await signIn(services, { ...who, password: 'quite another password' })
    changePerson(administering, inspector.personId, { name: 'Ines Falkenrath', role: 'auditor' })
    expect(checkSession(services, third.sessionId)).toBeNull()
  })
})

describe('signIn', () => {
  it('answers alike for an unknown address, a wrong password and a disabled account', async () => {
    const { services, administering, inspector } = opened()
    const answer = async (input: Partial<typeof who>) => signIn(services, { ...who, address: String(Math.random()), ...input }).catch((error: Error) => error.message)
    const unknown = await answer({ email: 'nobody@kestrelfold.example' })
    const wrong = await answer({ password: 'wrong' })
    setPersonDisabled(administering, inspector.personId, true)
    expect(new Set([unknown, wrong, await answer({})]).size).toBe(1)
  })

  it('slows down from the sixth try on, and forgets when the right password comes', async () => {
    const { services, setTime } = opened()
    for (let attempt = 1; attempt <= 5; attempt++) await expect(signIn(services, { ...who, password: 'no' })).rejects.toMatchObject({ code: 'wrong-password' })
    await expect(signIn(services, who)).rejects.toMatchObject({ code: 'too-many-requests' })
    await expect(signIn(services, { ...who, email: 'engineer@kestrelfold.example' })).rejects.toMatchObject({ code: 'too-many-requests' })
    setTime('2026-12-01T08:00:06.000Z')
    await signIn(services, who)
    await expect(signIn(services, { ...who, password: 'no' })).rejects.toMatchObject({ code: 'wrong-password' })
    await signIn(services, who)
  })
})

describe('accounts', () => {
  const newcomer = { name: 'Nell Harrowgate', email: 'Nell@Kestrelfold.example', role: 'inspector' as const, password: 'a first long password' }

  it('are added with a lower-case address that nobody else has', async () => {
    const { services, administering } = opened()
    const { id } = await addPerson(administering, newcomer)
    expect(services.db.select().from(people).where(eq(people.id, id)).get()).toMatchObject({ email: 'nell@kestrelfold.example', role: 'inspector', supplierId: null })
    await expect(addPerson(administering, newcomer)).rejects.toMatchObject({ details: { fields: [{ field: 'email' }] } })
  })

  it.each([
    ['a supplier’s contact without a supplier', { role: 'supplier' as const }],
    ['an inspector of a supplier', { supplierCode: 'TUVALO' }],
    ['a short password', { password: 'elevenchars' }],
    ['two addresses in one', { email: 'a@b.example, c@d.example' }],
    ['a line break in the name', { name: 'Nell\r\nBcc: x@y.example' }],
  ])('are refused for %s', async (_, wrong) => {
    const { services, administering } = opened()
    const before = services.db.select().from(people).all().length
    await expect(addPerson(administering, { ...newcomer, ...wrong })).rejects.toThrow()
    expect(services.db.select().from(people).all()).toHaveLength(before)
  })

  it('keep at least one administrator', () => {
    const { services, administering, administrator } = opened()
    expect(() => setPersonDisabled(administering, administrator.personId, true)).toThrow(/your own account/)
    const second = addTestPerson(services, 'administrator')
    setPersonDisabled(as(services, second), administrator.personId, true)
    expect(() => changePerson(as(services, second), second.personId, { name: 'x', role: 'inspector' })).toThrow(/last administrator/)
  })

  it('are listed without anything of their passwords', () => {
    const { administering } = opened()
    const list = listPeople(administering, { text: 'tuvalo', role: '', sort: 'name', order: 'rising', page: 1 })
    expect(list.rows).toMatchObject([{ email: 'quality@tuvalo.example', supplier: 'Tuvalo Precision Drives', noticeRank: 1 }])
    expect(JSON.stringify(list)).not.toMatch(/hash|password/i)
  })
})
