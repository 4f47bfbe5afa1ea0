import { FINDING_SEVERITY, type FindingCode } from '../../../../shared/findings.js';
import type { Finding } from '../../../../shared/output.js';

export function finding(code: FindingCode, message: string, evidence?: Finding['evidence']): Finding {
  return { code, severity: FINDING_SEVERITY[code], message, ...(evidence ? { evidence } : {}) };
}
