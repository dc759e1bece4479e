//! A store of text under keys. The app's is the browser's local storage.

/// Why a shelf refused: full, blocked, gone. In words.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{0}")]
pub struct ShelfError(pub String);

/// A store of text under keys.
pub trait Shelf {
    /// Every key, in any order.
    ///
    /// # Errors
    /// When the store can't be read.
    fn keys(&self) -> Result<Vec<String>, ShelfError>;
    /// The text under `key`.
    ///
    /// # Errors
    /// When the store can't be read.
    fn get(&self, key: &str) -> Result<Option<String>, ShelfError>;
    /// Puts `value` under `key`. The book uses fresh keys only, except for its pointer to the open case.
    ///
    /// # Errors
    /// When the store is full or blocked; nothing has changed then.
    fn put(&mut self, key: &str, value: &str) -> Result<(), ShelfError>;
    /// Removes `key`. The book does so only after the text was copied to its set-aside key.
    ///
    /// # Errors
    /// When the store refuses; the text is still there then.
    fn remove(&mut self, key: &str) -> Result<(), ShelfError>;
}
