const known: Readonly<Record<string, string>> = {
  external_account: 'a bank account for payouts',
  'tos_acceptance.date': 'your agreement to the provider’s terms',
  'tos_acceptance.ip': 'your agreement to the provider’s terms',
  business_type: 'whether you act as a person or a company',
  'business_profile.url': 'a web address or a description of what you sell',
  'business_profile.product_description': 'a web address or a description of what you sell',
  'business_profile.mcc': 'the kind of business',
  'individual.first_name': 'your name',
  'individual.last_name': 'your name',
  'individual.email': 'your e-mail address',
  'individual.phone': 'your telephone number',
  'individual.id_number': 'an identity number',
  'individual.ssn_last_4': 'an identity number',
  'individual.verification.document': 'a document that shows who you are',
  'individual.verification.additional_document': 'a document that shows where you live',
};

function wordsOf(requirement: string): string {
  const exact = known[requirement];
  if (exact !== undefined) return exact;
  if (/^(individual|representative)\.dob\./.test(requirement)) return 'your date of birth';
  if (/^(individual|representative)\.address\./.test(requirement)) return 'your address';
  return requirement.replaceAll(/[._]/g, ' ');
}

/** What the provider still asks for, in words, each once. What is not known here is told as the provider names it. */
export function requirementWords(requirements: readonly string[]): string[] {
  return [...new Set(requirements.map(wordsOf))];
}
