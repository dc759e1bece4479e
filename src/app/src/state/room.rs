//! The rooms and their addresses.

/// A room: one task.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Room {
    /// First open: cautions and the ways in.
    Start,
    /// Typing a gas.
    Gas,
    /// Typing settings.
    Settings,
    /// Where the patient is and is heading.
    Now,
    /// Trying a change.
    Change,
    /// Everything entered.
    Record,
    /// The case sheet.
    Person,
}

impl Room {
    /// Every room.
    pub const ALL: [Room; 7] =
        [Room::Start, Room::Gas, Room::Settings, Room::Now, Room::Change, Room::Record, Room::Person];

    /// Its address.
    pub const fn hash(self) -> &'static str {
        match self {
            Room::Start => "#/start",
            Room::Gas => "#/gas",
            Room::Settings => "#/settings",
            Room::Now => "#/now",
            Room::Change => "#/change",
            Room::Record => "#/record",
            Room::Person => "#/person",
        }
    }

    /// The room at an address; `None` for an address without one.
    pub fn at(hash: &str) -> Option<Room> {
        Room::ALL.into_iter().find(|room| room.hash() == hash)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_room_is_found_at_its_address() {
        for room in Room::ALL {
            assert_eq!(Room::at(room.hash()), Some(room));
        }
        assert_eq!(Room::at(""), None);
        assert_eq!(Room::at("#/apnoea"), None);
    }
}
