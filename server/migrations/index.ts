import { FirstSchema1796100000000 } from './1796100000000-firstSchema.ts'
import { Certificates1796200100000 } from './1796200100000-certificates.ts'
import { LibraryNumbers1796200200000 } from './1796200200000-libraryNumbers.ts'
import { ExactClassCounts1796200200001 } from './1796200200001-exactClassCounts.ts'
import { RigidAndFibres1796200200002 } from './1796200200002-rigidAndFibres.ts'
import { ImportedCandidates1796200300000 } from './1796200300000-importedCandidates.ts'
import { CandidateInvariants1796200400000 } from './1796200400000-candidateInvariants.ts'
import { SearchRunning1796300100000 } from './1796300100000-searchRunning.ts'
import { SearchEvents1796300200000 } from './1796300200000-searchEvents.ts'
import { ShortlistAssembly1796300300000 } from './1796300300000-shortlistAssembly.ts'
import { ExternalTables1796300300001 } from './1796300300001-externalTables.ts'
import { SampledEvaluations1796300400000 } from './1796300400000-sampledEvaluations.ts'
import { Explorations1796300400001 } from './1796300400001-explorations.ts'
import { LeaseBeats1796300500000 } from './1796300500000-leaseBeats.ts'
import { Surrogate1796300600000 } from './1796300600000-surrogate.ts'
import { SecondReader1796400000000 } from './1796400000000-secondReader.ts'
import { Reviewing1796400000001 } from './1796400000001-reviewing.ts'
import { Reissues1796400000002 } from './1796400000002-reissues.ts'
import { Comments1796500000000 } from './1796500000000-comments.ts'

/** In order. A migration that has been released is never edited. */
export const migrations = [
  FirstSchema1796100000000,
  Certificates1796200100000,
  LibraryNumbers1796200200000,
  ExactClassCounts1796200200001,
  RigidAndFibres1796200200002,
  ImportedCandidates1796200300000,
  CandidateInvariants1796200400000,
  SearchRunning1796300100000,
  SearchEvents1796300200000,
  ShortlistAssembly1796300300000,
  ExternalTables1796300300001,
  SampledEvaluations1796300400000,
  Explorations1796300400001,
  LeaseBeats1796300500000,
  Surrogate1796300600000,
  SecondReader1796400000000,
  Reviewing1796400000001,
  Reissues1796400000002,
  Comments1796500000000,
]
