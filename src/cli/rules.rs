//! The pages of the rules.

use std::fmt::Write;

use faying::findings::RULES;

use super::failure::Failure;

/// All pages by id, in the order in which findings are listed.
fn pages() -> Vec<(&'static str, &'static str)> {
    RULES.iter().map(|rule| (rule.id, rule.page)).collect()
}

/// The page of a rule, or the list of all rules.
pub fn text(id: Option<&str>) -> Result<String, Failure> {
    let pages = pages();
    let Some(id) = id else { return Ok(list(&pages)) };
    if let Some((_, page)) = pages.iter().find(|(own, _)| *own == id) {
        return Ok(format!("{}\n", page.trim_end()));
    }
    let ids: Vec<&str> = pages.iter().map(|(own, _)| *own).collect();
    let near = similar::get_close_matches(id, &ids, 3, 0.6);
    let hint = if near.is_empty() { String::new() } else { format!("; near it: {}", near.join(", ")) };
    Err(Failure::new(format!("no rule is called {id:?}{hint}; `faying rules` lists them all")))
}

fn list(pages: &[(&str, &str)]) -> String {
    let wide = pages.iter().map(|(id, _)| id.len()).max().unwrap_or(0);
    let mut text = String::new();
    for (id, page) in pages {
        // Writing to a String can't fail.
        let _ = writeln!(text, "{id:wide$}  {}", first_line(id, page));
    }
    text
}

/// The first line of a page that says more than its id.
fn first_line<'a>(id: &str, page: &'a str) -> &'a str {
    page.lines()
        .map(|line| line.trim_start_matches('#').trim())
        .find(|line| !line.is_empty() && *line != id)
        .unwrap_or("")
}
