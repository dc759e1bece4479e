//! The logbook's shelf: the browser's local storage, or a shelf that refuses where there is none.

use gloo_storage::{LocalStorage, Storage};
use leptos::prelude::window;
use logbook::{Shelf, ShelfError};

const BLOCKED: &str = "This browser keeps nothing: its storage is blocked.";
const FULL: &str = "This browser's storage is full or blocked.";

/// Local storage where the browser gives it.
#[derive(Clone, Copy)]
pub struct LocalShelf {
    there: bool,
}

impl LocalShelf {
    /// Asks for the storage once; a blocked one throws when touched.
    pub fn new() -> Self {
        Self { there: window().local_storage().is_ok_and(|storage| storage.is_some()) }
    }

    /// A shelf that reads as empty and refuses to keep.
    pub fn refusing() -> Self {
        Self { there: false }
    }
}

fn refused<T>(_: T) -> ShelfError {
    ShelfError(FULL.to_owned())
}

impl Shelf for LocalShelf {
    fn keys(&self) -> Result<Vec<String>, ShelfError> {
        if !self.there {
            return Ok(vec![]);
        }
        let storage = LocalStorage::raw();
        let length = storage.length().map_err(refused)?;
        Ok((0..length).filter_map(|index| storage.key(index).ok().flatten()).collect())
    }

    fn get(&self, key: &str) -> Result<Option<String>, ShelfError> {
        if self.there { LocalStorage::raw().get_item(key).map_err(refused) } else { Ok(None) }
    }

    fn put(&mut self, key: &str, value: &str) -> Result<(), ShelfError> {
        if !self.there {
            return Err(ShelfError(BLOCKED.to_owned()));
        }
        LocalStorage::raw().set_item(key, value).map_err(refused)
    }

    fn remove(&mut self, key: &str) -> Result<(), ShelfError> {
        if self.there { LocalStorage::raw().remove_item(key).map_err(refused) } else { Ok(()) }
    }
}
