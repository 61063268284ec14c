import { CreateFoundations1796126400001 } from './1796126400001-create-foundations.ts';
import { CreateAudit1796126400002 } from './1796126400002-create-audit.ts';
import { CreateStudies1796126400003 } from './1796126400003-create-studies.ts';
import { CreateFollowUp1796126400004 } from './1796126400004-create-follow-up.ts';
import { CreateAnalysis1796126400005 } from './1796126400005-create-analysis.ts';
import { CreateAllocation1796126400006 } from './1796126400006-create-allocation.ts';

/** In order. Named one by one: a pattern of file names would depend on how the process was started. */
export const migrations = [
  CreateFoundations1796126400001,
  CreateAudit1796126400002,
  CreateStudies1796126400003,
  CreateFollowUp1796126400004,
  CreateAnalysis1796126400005,
  CreateAllocation1796126400006,
];
