//! Catalogues and target lists: what they hold, the names things go by, the search.
