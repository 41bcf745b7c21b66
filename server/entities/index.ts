import { Account } from './account.ts'
import { Assignment } from './assignment.ts'
import { Campaign } from './campaign.ts'
import { CampaignPolytope } from './campaignPolytope.ts'
import { CandidateRecord } from './candidate.ts'
import { CandidateInvariants } from './candidateInvariants.ts'
import { CandidateValue } from './candidateValue.ts'
import { CertificateRecord } from './certificate.ts'
import { Certification } from './certification.ts'
import { CertificationTask } from './certificationTask.ts'
import { Collection } from './collection.ts'
import { CollectionPolytope } from './collectionPolytope.ts'
import { Comment } from './comment.ts'
import { ExploredCandidate } from './exploredCandidate.ts'
import { ExploredCells } from './exploredCells.ts'
import { ExploredColumn } from './exploredColumn.ts'
import { ExploredSample } from './exploredSample.ts'
import { ExternalRow } from './externalRow.ts'
import { ExternalTable } from './externalTable.ts'
import { Find } from './find.ts'
import { ImportedCandidate } from './importedCandidate.ts'
import { LibraryFile } from './libraryFile.ts'
import { Membership } from './membership.ts'
import { Mention } from './mention.ts'
import { NullSample } from './nullSample.ts'
import { PolytopeRecord } from './polytope.ts'
import { Rescoring } from './rescoring.ts'
import { Search } from './search.ts'
import { SearchEvent } from './searchEvent.ts'
import { SearchIsland } from './searchIsland.ts'
import { SearchSample } from './searchSample.ts'
import { SearchStart } from './searchStart.ts'
import { SetUpLink } from './setUpLink.ts'
import { Shortlist } from './shortlist.ts'
import { ShortlistEntry } from './shortlistEntry.ts'
import { ShortlistView } from './shortlistView.ts'
import { Target } from './target.ts'
import { TargetVersion } from './targetVersion.ts'
import { Verdict } from './verdict.ts'

/** Listed as classes, not found by file name: the same list serves source and compiled code. */
export const entities = [
  Account,
  Assignment,
  Campaign,
  CampaignPolytope,
  CandidateRecord,
  CandidateInvariants,
  CandidateValue,
  CertificateRecord,
  Certification,
  CertificationTask,
  Collection,
  CollectionPolytope,
  Comment,
  ExploredCandidate,
  ExploredCells,
  ExploredColumn,
  ExploredSample,
  ExternalRow,
  ExternalTable,
  Find,
  ImportedCandidate,
  LibraryFile,
  Membership,
  Mention,
  NullSample,
  PolytopeRecord,
  Rescoring,
  Search,
  SearchEvent,
  SearchIsland,
  SearchSample,
  SearchStart,
  SetUpLink,
  Shortlist,
  ShortlistEntry,
  ShortlistView,
  Target,
  TargetVersion,
  Verdict,
]
