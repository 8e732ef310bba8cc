//! Published mass metrics as pure functions of stated inputs.
