//! Checks circuit-breaker purchase specifications: text in, findings and figures out.
//!
//! Text becomes lines, lines become sheets, sheets become cases, a case gets its duty, the rules hold the case against its duty.
//! Nothing here reads a file, a clock or the environment; what comes from outside is handed in.

mod assess;
pub mod case;
pub mod documents;
pub mod duty;
pub mod finding;
pub mod particular;
pub mod physics;
pub mod quantity;
pub mod rules;
pub mod sheet;
pub mod source;
pub mod standards;

pub use assess::{Assessment, Assessor, CaseSummary};
pub use finding::{Edit, Finding, FindingKind};
pub use firstpole_grammar::Span;
pub use sheet::Date;
pub use source::{FileId, FilePlace, LoadFault, Loader, Place, Sources};
