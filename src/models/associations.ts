import { ApiToken } from './apiToken';
import { AuditEntry } from './auditEntry';
import { Booking } from './booking';
import { Calibration } from './calibration';
import { Equipment } from './equipment';
import { Evaluation } from './evaluation';
import { FactorTableRevision } from './factorTableRevision';
import { FileShape } from './fileShape';
import { Job } from './job';
import { LimitLineRevision } from './limitLineRevision';
import { LimitSet } from './limitSet';
import { ModificationState } from './modificationState';
import { CustodyMove } from './custodyMove';
import { Note } from './note';
import { OneTimeLink } from './oneTimeLink';
import { Organisation } from './organisation';
import { Photo } from './photo';
import { Product } from './product';
import { ProductClock } from './productClock';
import { ResultMail } from './resultMail';
import { Retest } from './retest';
import { RetestChange } from './retestChange';
import { Sample } from './sample';
import { Session } from './session';
import { SetupRecord } from './setupRecord';
import { SignalPath } from './signalPath';
import { SignalPathRevision } from './signalPathRevision';
import { Sweep } from './sweep';
import { SweepFile } from './sweepFile';
import { TestPosition } from './testPosition';
import { User } from './user';

/** Wires the models to one another; they never import each other. */
export function associate(): void {
  User.belongsTo(Organisation, { as: 'organisation', foreignKey: 'organisationId' });
  Session.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  OneTimeLink.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  ApiToken.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  AuditEntry.belongsTo(User, { as: 'actor', foreignKey: 'actorId' });

  Product.belongsTo(Organisation, { as: 'organisation', foreignKey: 'organisationId' });
  ProductClock.belongsTo(Product, { as: 'product', foreignKey: 'productId' });
  ProductClock.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  ProductClock.belongsTo(User, { as: 'withdrawer', foreignKey: 'withdrawnBy' });
  Job.belongsTo(Organisation, { as: 'organisation', foreignKey: 'organisationId' });
  Job.belongsTo(Product, { as: 'product', foreignKey: 'productId' });
  Job.hasMany(Sample, { as: 'samples', foreignKey: 'jobId' });
  Sample.belongsTo(Job, { as: 'job', foreignKey: 'jobId' });
  Sample.hasMany(ModificationState, { as: 'states', foreignKey: 'sampleId' });
  ModificationState.belongsTo(Sample, { as: 'sample', foreignKey: 'sampleId' });

  CustodyMove.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  Note.belongsTo(User, { as: 'user', foreignKey: 'userId' });

  Equipment.hasMany(Calibration, { as: 'calibrations', foreignKey: 'equipmentId' });
  Equipment.hasMany(FactorTableRevision, { as: 'tables', foreignKey: 'equipmentId' });
  FactorTableRevision.belongsTo(Equipment, { as: 'equipment', foreignKey: 'equipmentId' });
  FactorTableRevision.belongsTo(Calibration, { as: 'calibration', foreignKey: 'calibrationId' });
  FactorTableRevision.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  LimitLineRevision.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  SignalPath.hasMany(SignalPathRevision, { as: 'revisions', foreignKey: 'signalPathId' });
  SignalPathRevision.belongsTo(SignalPath, { as: 'path', foreignKey: 'signalPathId' });
  SignalPathRevision.belongsTo(User, { as: 'user', foreignKey: 'userId' });

  Sweep.belongsTo(ModificationState, { as: 'state', foreignKey: 'stateId' });
  ModificationState.hasMany(Sweep, { as: 'sweeps', foreignKey: 'stateId' });
  Sweep.belongsTo(SweepFile, { as: 'file', foreignKey: 'sweepFileId' });
  Sweep.belongsTo(SignalPathRevision, { as: 'pathRevision', foreignKey: 'pathRevisionId' });
  Sweep.belongsTo(LimitSet, { as: 'limitSet', foreignKey: 'limitSetId' });
  Sweep.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  Sweep.belongsTo(User, { as: 'voider', foreignKey: 'voidedBy' });
  Evaluation.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  Sweep.belongsTo(Evaluation, { as: 'evaluation', foreignKey: 'evaluationId', constraints: false });
  FileShape.belongsTo(Sweep, { as: 'sweep', foreignKey: 'sweepId' });
  Evaluation.belongsTo(Sweep, { as: 'sweep', foreignKey: 'sweepId' });

  Retest.belongsTo(ModificationState, { as: 'state', foreignKey: 'stateId' });
  Retest.belongsTo(ModificationState, { as: 'carried', foreignKey: 'carriedTo' });
  Retest.belongsTo(LimitLineRevision, { as: 'limitLine', foreignKey: 'lineRevisionId' });
  Retest.belongsTo(Sweep, { as: 'sweep', foreignKey: 'sweepId' });
  Retest.belongsTo(Retest, { as: 'origin', foreignKey: 'originId' });
  RetestChange.belongsTo(Retest, { as: 'retest', foreignKey: 'retestId' });
  RetestChange.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  RetestChange.belongsTo(Sweep, { as: 'sweep', foreignKey: 'sweepId' });

  SetupRecord.belongsTo(Sweep, { as: 'sweep', foreignKey: 'sweepId' });
  SetupRecord.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  Photo.belongsTo(Sweep, { as: 'sweep', foreignKey: 'sweepId' });
  Photo.belongsTo(User, { as: 'user', foreignKey: 'userId' });
  Photo.belongsTo(User, { as: 'withdrawer', foreignKey: 'withdrawnBy' });

  Booking.belongsTo(TestPosition, { as: 'position', foreignKey: 'positionId' });
  Booking.belongsTo(User, { as: 'technician', foreignKey: 'technicianId' });
  Booking.belongsTo(Sample, { as: 'sample', foreignKey: 'sampleId' });
  Booking.belongsTo(ModificationState, { as: 'modification', foreignKey: 'stateId' });

  ResultMail.belongsTo(Sample, { as: 'sample', foreignKey: 'sampleId' });
  ResultMail.belongsTo(ModificationState, { as: 'state', foreignKey: 'stateId' });
  ResultMail.belongsTo(User, { as: 'recipient', foreignKey: 'recipientId' });
  ResultMail.belongsTo(User, { as: 'sender', foreignKey: 'senderId' });
}
