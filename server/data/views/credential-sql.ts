/**
 * The rules of `shared/domain/validity` as SQL, so that lists of many thousand credentials can be filtered, sorted
 * and paged in the database. A property test holds both against each other. Aliases: `c` credential, `t` its type,
 * `p` its person; the queries that use it define `asked` and `limited` first.
 */
export interface CredentialSql {
  /** Which duties ask for a module's credential, and for how recent a practice. */
  asked: string
  /** Module types whose every asking duty asks for recent practice. */
  limited: string
  /** The last good day that counts, null when it never expires. */
  expires: (alias: string) => string
  state: string
  /** The same over rows that hold `expires_on` and `starts_on` already, under the alias `f`: they are worked out once. */
  stateOfFacts: string
  /** The first day on which it can count. */
  starts: (alias: string) => string
  /** The one counting credential of its person and type that lasts longest. */
  isEffective: string
  /** The effective one, or the expired one that lasted longest where nothing counts. */
  isStanding: string
  isEmployed: string
  /** Cheap first cut on the stored date; leaves in all that recent practice may end earlier. */
  mayExpireBy: (days: number) => string
  isWithin: (days: number, includeExpired: boolean) => string
  /** Binds `:site` and `:day`. A person's own assignment of the day beats the crew's. */
  isRosteredAt: string
}

const never = '\'9999-12-32\''

/** Builds the expressions for one day; `today` must be a calendar date (it stands in the text). */
export function credentialSql(today: string): CredentialSql {
  const day = `'${today}'`
  const starts = (alias: string) => `max(${alias}.issued_on, coalesce(json_extract(${alias}.details, '$.judgedOn'), ${alias}.issued_on))`
  const practiced = (alias: string) => `(select max(date(max(${starts(alias)}, coalesce((select max(done_on) from duty_days dd where dd.person_id = ${alias}.person_id and dd.duty_id = a.duty_id and dd.done_on <= ${day}), ${starts(alias)})), '+' || a.recency_months || ' months', 'floor')) from asked a where a.type_id = ${alias}.type_id)`
  const expires = (alias: string) => `(case when ${alias}.type_id in (select type_id from limited) then min(coalesce(${alias}.expires_on, ${never}), ${practiced(alias)}) else ${alias}.expires_on end)`
  const begun = (alias: string) => `(${alias}.verification = 'verified' and ${starts(alias)} <= ${day} and (${alias}.withdrawn_on is null or ${alias}.withdrawn_on > ${day}))`
  const counting = (alias: string) => `(${begun(alias)} and coalesce(${expires(alias)}, ${never}) >= ${day})`
  const expired = (alias: string) => `(${begun(alias)} and ${expires(alias)} < ${day})`
  const lastDay = (alias: string) => `min(coalesce(${expires(alias)}, ${never}), coalesce(date(${alias}.withdrawn_on, '-1 day'), ${never}))`
  const outlasts = `(${lastDay('o')}, o.issued_on, o.id) > (${lastDay('c')}, c.issued_on, c.id)`
  const sameKind = 'o.person_id = c.person_id and o.type_id = c.type_id and o.id <> c.id and (t.per_site = 0 or o.site_id is c.site_id)'
  const isEffective = `(${counting('c')} and not exists (select 1 from credentials o where ${sameKind} and ${counting('o')} and ${outlasts}))`
  const isStandingExpired = `(${expired('c')} and not exists (select 1 from credentials o where ${sameKind} and (${counting('o')} or (${expired('o')} and ${outlasts}))))`
  const stateFrom = (at: { row: string, starts: string, expires: string, leadDays: string }) => `(case when ${at.row}.verification = 'rejected' then 'rejected' when ${at.row}.withdrawn_on <= ${day} then 'withdrawn' when ${at.row}.verification = 'unverified' then 'unverified' when ${at.starts} > ${day} then 'notYet' when ${at.expires} is null then 'inDate' when ${at.expires} < ${day} then 'expired' when ${at.expires} <= date(${day}, '+' || ${at.leadDays} || ' days') then 'dueSoon' else 'inDate' end)`
  const last = (days: number) => `date(${day}, '+${Math.trunc(days)} days')`
  return {
    asked: 'select distinct rt.type_id, d.id as duty_id, d.recency_months from rule_types rt join rules r on r.id = rt.rule_id join duties d on d.id = r.duty_id join credential_types t on t.id = rt.type_id where t.module is not null',
    limited: 'select type_id from asked group by type_id having count(*) = count(recency_months)',
    expires,
    state: stateFrom({ row: 'c', starts: starts('c'), expires: expires('c'), leadDays: 't.lead_days' }),
    stateOfFacts: stateFrom({ row: 'f', starts: 'f.starts_on', expires: 'f.expires_on', leadDays: 'f.lead_days' }),
    starts,
    isEffective,
    isStanding: `(${isEffective} or ${isStandingExpired})`,
    isEmployed: `(p.hired_on <= ${day} and (p.left_on is null or p.left_on >= ${day}))`,
    mayExpireBy: days => `(c.expires_on <= ${last(days)} or c.type_id in (select type_id from limited))`,
    isWithin: (days, includeExpired) => ` between ${includeExpired ? '\'0000-00-00\'' : day} and ${last(days)}`,
    isRosteredAt: `exists (select 1 from assignments a where a.site_id = :site and a.starts_on <= :day and (a.ends_on is null or a.ends_on >= :day) and (a.person_id = p.id or (a.crew_id = p.crew_id and not exists (select 1 from assignments b where b.person_id = p.id and b.starts_on <= :day and (b.ends_on is null or b.ends_on >= :day)))))`,
  }
}
