/** One thing that a record of a type must tell by law, and where that is written. */
export interface LegalDetail {
  field: 'trainer' | 'evaluator' | 'evaluatedOn' | 'equipment' | 'expiresOn' | 'issuer'
  source: string
}

const certification = '29 CFR 1926.503(b)'
const evaluation = '29 CFR 1910.178(l)(6)'
const fitRecord = '29 CFR 1910.134(m)(2) (from memory)'

/** What the written record must hold beside the name and the date, by type code. Types not named here ask for nothing more. */
const legalDetails: Record<string, readonly LegalDetail[]> = {
  'fall-protection': [{ field: 'trainer', source: certification }],
  'lift-truck': [
    { field: 'trainer', source: evaluation },
    { field: 'evaluator', source: evaluation },
    { field: 'evaluatedOn', source: evaluation },
    { field: 'equipment', source: '29 CFR 1910.178(l): the kind of truck' },
  ],
  'signal-person': [{ field: 'evaluator', source: '29 CFR 1926.1428 (from memory)' }],
  'respirator-fit': [{ field: 'equipment', source: fitRecord }, { field: 'evaluator', source: fitRecord }],
  'first-aid-cpr': [{ field: 'issuer', source: '29 CFR 1926.50(c)' }],
}

/** What the record of a type still lacks by law; an empty list when nothing, or when the law asks for nothing more. */
export function missingLegalDetails(type: string, held: Readonly<Partial<Record<LegalDetail['field'], string | null | undefined>>>): LegalDetail[] {
  return (legalDetails[type] ?? []).filter(({ field }) => !held[field])
}
