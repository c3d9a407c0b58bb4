//! The files a user writes, read strictly into the types of the floors below.
