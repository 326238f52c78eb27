//! A window whose pixels the processor paints, for systems without OpenGL.

use std::num::NonZeroU32;
use std::rc::Rc;
use std::time::{Duration, Instant};

use eframe::egui::{
    Color32, Context, FullOutput, Ui, ViewportBuilder, ViewportCommand, ViewportEvent, ViewportId,
    ViewportInfo,
};
use egui_winit::{ActionRequested, State, accesskit_winit};
use softbuffer::Surface;
use winit::application::ApplicationHandler;
use winit::event::{StartCause, WindowEvent};
use winit::event_loop::{ActiveEventLoop, ControlFlow, EventLoop, EventLoopProxy, OwnedDisplayHandle};
use winit::window::{Window, WindowId};

use super::canvas::Canvas;
use super::paint::Painter;

/// A wait longer than this is a wait for the next event.
const LONGEST_WAIT: Duration = Duration::from_secs(86_400);

/// What is shown in the window.
pub trait Show {
    /// One frame.
    fn frame(&mut self, ui: &mut Ui);
    /// The colour behind everything.
    fn ground(&self, ctx: &Context) -> Color32;
    /// The window has gone.
    fn leave(&mut self);
}

/// Makes what the window shows, once there is a window.
pub type Make = Box<dyn FnOnce(&Context) -> Box<dyn Show>>;

/// Opens a window, shows in it what `make` gives, and comes back when it is closed.
///
/// # Errors
/// Words for the user: no display answers, or the system gives no window or no pixels.
pub fn run(builder: ViewportBuilder, make: Make) -> Result<(), String> {
    let events = EventLoop::<Call>::with_user_event().build().map_err(|error| error.to_string())?;
    let display =
        softbuffer::Context::new(events.owned_display_handle()).map_err(|error| error.to_string())?;
    let mut program = Program {
        builder,
        make: Some(make),
        calls: events.create_proxy(),
        display,
        opened: None,
        trouble: None,
    };
    events.run_app(&mut program).map_err(|error| error.to_string())?;
    program.trouble.map_or(Ok(()), Err)
}

/// What reaches the event loop from elsewhere.
#[derive(Debug)]
enum Call {
    /// Somebody wants a frame at this time.
    Frame(Instant),
    /// A screen reader wants something.
    Reader(accesskit_winit::Event),
}

impl From<accesskit_winit::Event> for Call {
    fn from(event: accesskit_winit::Event) -> Self {
        Self::Reader(event)
    }
}

struct Program {
    builder: ViewportBuilder,
    make: Option<Make>,
    calls: EventLoopProxy<Call>,
    display: softbuffer::Context<OwnedDisplayHandle>,
    opened: Option<Opened>,
    trouble: Option<String>,
}

/// The window while it is open.
struct Opened {
    window: Rc<Window>,
    surface: Surface<OwnedDisplayHandle, Rc<Window>>,
    ctx: Context,
    state: State,
    info: ViewportInfo,
    painter: Painter,
    show: Box<dyn Show>,
    next: Option<Instant>,
    shown: bool,
}

impl Program {
    fn open(&mut self, events: &ActiveEventLoop) -> Result<Opened, String> {
        let ctx = Context::default();
        // A screen reader must know the window before it is shown.
        let builder = self.builder.clone().with_visible(false);
        let window = egui_winit::create_window(&ctx, events, &builder).map_err(|error| error.to_string())?;
        let window = Rc::new(window);
        let surface = Surface::new(&self.display, Rc::clone(&window)).map_err(|error| error.to_string())?;
        let scale = window.scale_factor() as f32;
        let side = Some(Painter::LARGEST_TEXTURE);
        let mut state = State::new(ctx.clone(), ViewportId::ROOT, events, Some(scale), window.theme(), side);
        state.init_accesskit(events, &window, self.calls.clone());
        let calls = self.calls.clone();
        ctx.set_request_repaint_callback(move |wanted| {
            // The window may have gone by then.
            let _ = calls.send_event(Call::Frame(Instant::now() + wanted.delay.min(LONGEST_WAIT)));
        });
        let mut info = ViewportInfo::default();
        egui_winit::update_viewport_info(&mut info, &ctx, &window, true);
        let make = self.make.take().ok_or("the window was opened twice")?;
        let show = make(&ctx);
        let painter = Painter::default();
        Ok(Opened { window, surface, ctx, state, info, painter, show, next: None, shown: false })
    }

    fn fail(&mut self, events: &ActiveEventLoop, words: String) {
        self.trouble = Some(words);
        events.exit();
    }
}

impl ApplicationHandler<Call> for Program {
    fn resumed(&mut self, events: &ActiveEventLoop) {
        if self.opened.is_some() {
            return;
        }
        match self.open(events) {
            Ok(mut opened) => {
                // The first frame comes before the window, which no system asks to redraw while it is hidden.
                match opened.frame(events) {
                    Ok(()) => self.opened = Some(opened),
                    Err(words) => self.fail(events, words),
                }
            }
            Err(words) => self.fail(events, words),
        }
    }

    fn window_event(&mut self, events: &ActiveEventLoop, _id: WindowId, event: WindowEvent) {
        let Some(opened) = &mut self.opened else { return };
        match event {
            // Not passed on: it would be answered with the wish for another frame, for ever.
            WindowEvent::RedrawRequested => {
                if let Err(words) = opened.frame(events) {
                    self.fail(events, words);
                }
            }
            WindowEvent::CloseRequested => {
                opened.info.events.push(ViewportEvent::Close);
                opened.window.request_redraw();
            }
            event => {
                if opened.state.on_window_event(&opened.window, &event).repaint {
                    opened.window.request_redraw();
                }
            }
        }
    }

    fn user_event(&mut self, _events: &ActiveEventLoop, call: Call) {
        let Some(opened) = &mut self.opened else { return };
        match call {
            Call::Frame(at) => opened.next = Some(opened.next.map_or(at, |next| next.min(at))),
            Call::Reader(event) => opened.hear(event.window_event),
        }
    }

    fn new_events(&mut self, _events: &ActiveEventLoop, _cause: StartCause) {}

    /// Asks for the frame whose time has come, and sleeps until then.
    fn about_to_wait(&mut self, events: &ActiveEventLoop) {
        let Some(opened) = &mut self.opened else { return };
        match opened.next {
            Some(at) if at <= Instant::now() => {
                opened.next = None;
                opened.window.request_redraw();
                events.set_control_flow(ControlFlow::Wait);
            }
            Some(at) => events.set_control_flow(ControlFlow::WaitUntil(at)),
            None => events.set_control_flow(ControlFlow::Wait),
        }
    }

    fn exiting(&mut self, _events: &ActiveEventLoop) {
        if let Some(mut opened) = self.opened.take() {
            opened.show.leave();
        }
    }
}

impl Opened {
    fn hear(&mut self, event: accesskit_winit::WindowEvent) {
        match event {
            accesskit_winit::WindowEvent::InitialTreeRequested => self.ctx.enable_accesskit(),
            accesskit_winit::WindowEvent::ActionRequested(request) => {
                self.state.on_accesskit_action_request(request);
            }
            accesskit_winit::WindowEvent::AccessibilityDeactivated => self.ctx.disable_accesskit(),
        }
        self.window.request_redraw();
    }

    fn frame(&mut self, events: &ActiveEventLoop) -> Result<(), String> {
        egui_winit::update_viewport_info(&mut self.info, &self.ctx, &self.window, false);
        let mut input = self.state.take_egui_input(&self.window);
        input.viewports = [(ViewportId::ROOT, self.info.clone())].into_iter().collect();
        let closing = self.info.close_requested();
        self.info.events.clear();
        let mut output = self.ctx.run_ui(input, |ui| self.show.frame(ui));
        let commands = output.viewport_output.remove(&ViewportId::ROOT).map(|root| root.commands);
        let commands = commands.unwrap_or_default();
        if closing && !commands.contains(&ViewportCommand::CancelClose) {
            events.exit();
        }
        let platform = std::mem::take(&mut output.platform_output);
        self.state.handle_platform_output_with_event_loop(&self.window, events, platform);
        self.paint(output)?;
        self.follow(commands);
        Ok(())
    }

    /// Does what the frame wants of the window.
    fn follow(&mut self, commands: Vec<ViewportCommand>) {
        let mut actions = Vec::new();
        egui_winit::process_viewport_commands(
            &self.ctx,
            &mut self.info,
            commands,
            &self.window,
            &mut actions,
        );
        for action in actions {
            let event = match action {
                ActionRequested::Cut => eframe::egui::Event::Cut,
                ActionRequested::Copy => eframe::egui::Event::Copy,
                ActionRequested::Paste => match self.state.clipboard_text() {
                    Some(text) => eframe::egui::Event::Paste(text),
                    None => continue,
                },
                // Nothing here takes pictures of itself or works while it is hidden.
                ActionRequested::Screenshot(_) | ActionRequested::PaintWhileHidden => continue,
            };
            self.state.egui_input_mut().events.push(event);
        }
        if !self.info.events.is_empty() || !self.state.egui_input().events.is_empty() {
            self.window.request_redraw();
        }
        if !self.shown {
            self.shown = true;
            self.window.set_visible(true);
            self.window.request_redraw();
        }
    }

    fn paint(&mut self, mut output: FullOutput) -> Result<(), String> {
        self.painter.take(&output.textures_delta);
        let size = self.window.inner_size();
        let (Some(width), Some(height)) = (NonZeroU32::new(size.width), NonZeroU32::new(size.height)) else {
            // A window that is folded away still brings textures.
            self.painter.drop_old(&mut output.textures_delta);
            return Ok(());
        };
        let blank = Canvas::new(size.width as usize, size.height as usize, self.show.ground(&self.ctx));
        let canvas = self.painter.paint(&self.ctx, output.shapes, output.pixels_per_point, blank);
        self.painter.drop_old(&mut output.textures_delta);
        self.surface.resize(width, height).map_err(|error| error.to_string())?;
        let mut buffer = self.surface.buffer_mut().map_err(|error| error.to_string())?;
        copy(&canvas, &mut buffer);
        self.window.pre_present_notify();
        buffer.present().map_err(|error| error.to_string())
    }
}

/// Copies the pixels in the form that the system wants: 0x00RRGGBB.
fn copy(canvas: &Canvas, buffer: &mut [u32]) {
    for (place, pixel) in buffer.iter_mut().zip(canvas.pixels()) {
        *place = u32::from_be_bytes([0, pixel.r(), pixel.g(), pixel.b()]);
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn pixels_are_red_green_blue_from_the_upper_byte_but_one() {
        let mut buffer = [9; 2];
        copy(&Canvas::new(2, 1, Color32::from_rgb(0x12, 0x34, 0x56)), &mut buffer);
        assert_eq!(buffer, [0x0012_3456; 2]);
    }
}
