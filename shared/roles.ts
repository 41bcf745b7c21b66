import { z } from 'zod'

export const roles = ['lead', 'investigator', 'reviewer', 'reader'] as const
export const roleSchema = z.enum(roles)
export type Role = (typeof roles)[number]

/** The one table of who may do what in a campaign; server and client both read it. */
export const permissions = {
  'campaign.read': ['lead', 'investigator', 'reviewer', 'reader'],
  'campaign.edit': ['lead'],
  'members.manage': ['lead'],
  'polytopes.import': ['lead', 'investigator'],
  'collections.edit': ['lead', 'investigator'],
  'collections.publish': ['lead'],
  'targets.edit': ['lead', 'investigator'],
  'previews.run': ['lead', 'investigator', 'reviewer', 'reader'],
  'searches.run': ['lead', 'investigator'],
  'shortlists.edit': ['lead', 'investigator'],
  'verdicts.give': ['lead', 'investigator', 'reviewer'],
  /** Handing candidates to a reviewer. */
  'verdicts.assign': ['lead', 'investigator', 'reviewer'],
  /** Views of a shortlist under names; those of others are a lead's. */
  'views.save': ['lead', 'investigator', 'reviewer'],
  'comments.write': ['lead', 'investigator', 'reviewer'],
  'certificates.run': ['lead', 'investigator', 'reviewer'],
  /** Tables of external columns: brought along, replaced, removed. */
  'external.edit': ['lead', 'investigator', 'reviewer'],
  'exports.read': ['lead', 'investigator', 'reviewer', 'reader'],
} as const satisfies Record<string, readonly Role[]>

export type Permission = keyof typeof permissions

export function may(role: Role | null | undefined, permission: Permission): boolean {
  return role !== null && role !== undefined && (permissions[permission] as readonly Role[]).includes(role)
}
