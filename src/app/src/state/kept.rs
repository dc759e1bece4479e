//! What is kept on the device beside the book: drafts. And what other tabs do to both.

use leptos::prelude::*;
use logbook::{Book, Shelf};

use super::app::App;
use super::draft::{self, DRAFTS, SET_ASIDE};
use super::sheet::Sheet;
use crate::device::{clock, page, ready};
use crate::words::start as words;

impl App {
    /// Keeps what is typed, says before the page is left that something would be lost, and takes up what other
    /// tabs write.
    pub(super) fn keep(self) {
        Effect::new(move |before: Option<()>| {
            self.sheet.track();
            if before.is_some() {
                self.keep_draft();
            }
        });
        page::before_leaving(move || self.would_lose());
        page::on_stored(move |key| match key {
            Some(key) if key.starts_with(DRAFTS) => {
                if key == self.draft_key() {
                    self.take_up_draft();
                }
            }
            _ => self.reopen(),
        });
        page::on_seen(move || {
            self.reopen();
            self.take_up_draft();
        });
    }

    /// Whether something stands only on this screen.
    pub fn would_lose(self) -> bool {
        self.draft_lost.get_untracked() || self.book.with_value(Book::unsaved) > 0
    }

    /// Takes the new version, which loads the page anew, unless something would be lost with it.
    pub fn take_update(self) {
        if self.would_lose() {
            self.trouble.set(words::UPDATE_WAITS.to_owned());
        } else {
            ready::take_update();
        }
    }

    fn draft_key(self) -> String {
        self.open.with_untracked(|open| draft::key(open.as_ref().map(|open| open.id.0.as_str())))
    }

    /// The open case's draft. One that can't be read whole is moved aside, as nothing typed is written over unread.
    pub(super) fn kept_draft(self) -> Sheet {
        self.draft_at(&self.draft_key())
    }

    fn draft_at(self, key: &str) -> Sheet {
        let text = self.shelf.with_value(|shelf| shelf.get(key));
        let Ok(Some(text)) = text else { return Sheet::default() };
        let (mut sheet, whole) = draft::from_text(&text);
        if !whole {
            self.move_aside(key, &text);
        }
        sheet.age_chips(&clock::now());
        sheet
    }

    fn move_aside(self, key: &str, text: &str) {
        self.shelf.update_value(|shelf| {
            let tail = key.strip_prefix("slackwater.").unwrap_or(key);
            let mut free = (1_u32..).map(|n| format!("{SET_ASIDE}{tail}.{n}"));
            let aside = free.find(|aside| !matches!(shelf.get(aside), Ok(Some(_))));
            // Where the shelf refuses, the text stays where it is until it is typed over.
            if aside.is_some_and(|aside| shelf.put(&aside, text).is_ok()) {
                let _ = shelf.remove(key);
            }
        });
        self.trouble.set(words::DRAFT_DAMAGED.to_owned());
        self.reopen();
    }

    /// Keeps the sheet as the open case's draft. While entries are only in memory the draft stays as it was: what
    /// they were typed from is nowhere else that outlives the page.
    pub(super) fn keep_draft(self) {
        if self.book.with_value(Book::unsaved) > 0 {
            return;
        }
        let key = self.draft_key();
        let text = self.sheet.with_untracked(draft::to_text);
        let mut kept = Ok(());
        self.shelf.update_value(|shelf| {
            kept = match &text {
                Some(text) => shelf.put(&key, text),
                None => shelf.remove(&key),
            };
        });
        if self.draft_lost.get_untracked() != kept.is_err() {
            self.draft_lost.set(kept.is_err());
        }
    }

    /// What was typed before there was a case for it becomes the open case's draft.
    pub(super) fn adopt_first_draft(self) {
        self.keep_draft();
        if !self.would_lose() {
            self.shelf.update_value(|shelf| {
                // One that stays is offered again to the next case.
                let _ = shelf.remove(&draft::key(None));
            });
        }
    }

    /// The draft that waits for a case.
    pub(super) fn first_draft(self) -> Sheet {
        self.draft_at(&draft::key(None))
    }

    /// Takes up the draft as another tab left it, unless this one's is not kept.
    fn take_up_draft(self) {
        if self.would_lose() {
            return;
        }
        let kept = self.kept_draft();
        if self.sheet.with_untracked(|sheet| *sheet != kept) {
            self.sheet.set(kept);
        }
    }

    /// Reads the book anew, since another tab may have written in it. This tab's case stays open, whichever is
    /// open there. Not while entries are only in this tab's memory: they would be lost.
    fn reopen(self) {
        if self.book.with_value(Book::unsaved) > 0 {
            return;
        }
        let Ok(book) = Book::open(self.shelf.get_value()) else { return };
        let first = self.chosen.with_value(Option::is_none);
        if first {
            self.chosen.set_value(book.open_case().map(|(id, _)| id.clone()));
        }
        self.book.set_value(book);
        self.revision.update(|revision| *revision += 1);
        if first && self.chosen.with_value(Option::is_some) {
            self.sheet.set(self.kept_draft());
        }
    }
}
