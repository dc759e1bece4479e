//! A key under a finger: it acts on release, forgives a slide of 12 px, and may repeat while it is held.

use std::cell::Cell;
use std::rc::Rc;
use std::time::Duration;

use leptos::ev::{MouseEvent, PointerEvent};
use leptos::prelude::*;
use send_wrapper::SendWrapper;

use super::buttons::Press;
use super::keys::within_slop;

/// Four repeats a second while a key is held.
const REPEAT: Duration = Duration::from_millis(250);
/// A click this soon after a release belongs to it.
const AFTER_POINTER_MS: f64 = 400.0;

/// What a key does; says whether a held key should stop.
pub type Act = Box<dyn Fn() -> bool>;

/// How a key looks and behaves.
pub struct Look {
    /// What is printed on it.
    pub sign: &'static str,
    /// What it is called.
    pub name: String,
    /// Its class.
    pub class: &'static str,
    /// When it acts.
    pub acts: Acts,
}

/// When a key acts.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Acts {
    /// At the release, so that two thumbs can type faster than clicks come.
    AtRelease,
    /// At the release, and repeatedly while it is held.
    WhileHeld,
    /// At the click that follows the release: for what moves the page, where another button would come to
    /// lie under the finger before the click.
    AtClick,
}

/// Where a finger went down, and what has become of it.
struct Finger {
    down: Cell<Option<(i32, f64, f64)>>,
    timer: Cell<Option<IntervalHandle>>,
    repeated: Cell<bool>,
    released_at: Cell<f64>,
    /// Whether the last release was a press, and its click is still to come.
    due: Cell<bool>,
    acts: Acts,
    act: Act,
}

impl Finger {
    fn stop(&self) {
        if let Some(timer) = self.timer.take() {
            timer.clear();
        }
    }

    fn pressed(self: &Rc<Self>, event: &PointerEvent) {
        self.stop();
        self.repeated.set(false);
        self.down.set(Some((event.pointer_id(), x(event), y(event))));
        if self.acts == Acts::WhileHeld {
            let finger = Rc::clone(self);
            let again = move || {
                finger.repeated.set(true);
                if (finger.act)() {
                    finger.stop();
                }
            };
            self.timer.set(set_interval_with_handle(again, REPEAT).ok());
        }
    }

    fn released(&self, event: &PointerEvent) {
        self.stop();
        // A slide off the key is neither a press nor the click that may follow it.
        self.released_at.set(event.time_stamp());
        let hit = self
            .down
            .take()
            .is_some_and(|(id, x0, y0)| id == event.pointer_id() && within_slop(x0, y0, x(event), y(event)));
        self.due.set(hit && self.acts == Acts::AtClick);
        if hit && self.acts != Acts::AtClick && !self.repeated.get() {
            (self.act)();
        }
    }

    /// The click that was due, or one without a finger: from a switch or a screen reader.
    fn clicked(&self, event: &MouseEvent) {
        if self.due.take() || event.time_stamp() - self.released_at.get() > AFTER_POINTER_MS {
            (self.act)();
        }
    }
}

fn x(event: &PointerEvent) -> f64 {
    f64::from(event.client_x())
}

fn y(event: &PointerEvent) -> f64 {
    f64::from(event.client_y())
}

/// A key. It is not in the tab order: a keyboard types into the field itself, whose focus stays where it is.
pub fn key(look: Look, act: Act) -> AnyView {
    let finger = Rc::new(Finger {
        down: Cell::new(None),
        timer: Cell::new(None),
        repeated: Cell::new(false),
        released_at: Cell::new(f64::NEG_INFINITY),
        due: Cell::new(false),
        acts: look.acts,
        act,
    });
    let on = |what: fn(&Rc<Finger>, &PointerEvent)| -> Box<dyn FnMut(PointerEvent)> {
        let finger = Rc::clone(&finger);
        Box::new(move |event| what(&finger, &event))
    };
    let (down, up) = (on(Finger::pressed), on(|finger, event| finger.released(event)));
    let (leave, cancel) = (on(|finger, _| finger.stop()), on(|finger, _| finger.stop()));
    let gone = SendWrapper::new(Rc::clone(&finger));
    on_cleanup(move || gone.stop());
    let click: Press = Box::new(move |event| finger.clicked(&event));
    view! {
        <button
            type="button"
            class=look.class
            tabindex="-1"
            aria-label=look.name
            on:mousedown=stay()
            on:contextmenu=stay()
            on:pointerdown=down
            on:pointerup=up
            on:pointerleave=leave
            on:pointercancel=cancel
            on:click=click
        >
            {look.sign}
        </button>
    }
    .into_any()
}

/// The focus stays where it is, and a long press opens no menu.
pub fn stay() -> Press {
    Box::new(|event| event.prevent_default())
}
