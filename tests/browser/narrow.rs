//! Nothing is cut off on the narrowest screens, nor with text at twice its size.

use crate::harness::Setup;
use serde_json::json;

const ROOMS: [&str; 4] = ["", "#/now", "#/change", "#/record"];

#[test]
fn nothing_overflows_at_320_pixels() {
    Setup::default().size(320, 640).run(|world| async move {
        for room in ROOMS {
            world.phone.open(&format!("?{room}")).await?;
            world.phone.wait_until_started().await?;
            assert_eq!(world.phone.overflow().await?, json!([]), "in {room:?}");
            world.phone.shot(&format!("narrow{}", room.replace(['#', '/'], "-"))).await?;
        }
        Ok(())
    });
}

#[test]
fn nothing_overflows_with_text_twice_as_large() {
    Setup::default().run(|world| async move {
        for room in ROOMS {
            world.phone.open(&format!("?{room}")).await?;
            world.phone.wait_until_started().await?;
            world.phone.script("document.documentElement.style.fontSize = '200%'", vec![]).await?;
            assert_eq!(world.phone.overflow().await?, json!([]), "in {room:?}");
        }
        Ok(())
    });
}
